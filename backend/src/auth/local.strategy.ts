import { Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import type { Request } from 'express';
import { Strategy } from 'passport-local';
import type { Principal } from './principal.js';
import { SignInService } from './sign-in.service.js';

@Injectable()
export class LocalStrategy extends PassportStrategy(Strategy) {
  constructor(private readonly signIn: SignInService) {
    super({ usernameField: 'email', passReqToCallback: true });
  }

  validate(request: Request, email: string, password: string): Promise<Principal> {
    return this.signIn.signIn(email, password, request.ip ?? '');
  }
}

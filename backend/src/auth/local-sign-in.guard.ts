import { Injectable, type ExecutionContext } from '@nestjs/common';
import { AuthGuard } from '@nestjs/passport';
import { signInSchema } from '@stayledger/shared/contracts/auth';
import type { Request } from 'express';
import { ZodValidationException } from 'nestjs-zod';

/** Checks the body (guards run before pipes), lets the strategy decide, and begins a new session. */
@Injectable()
export class LocalSignInGuard extends AuthGuard('local') {
  override async canActivate(context: ExecutionContext): Promise<boolean> {
    const request = context.switchToHttp().getRequest<Request>();
    const body = signInSchema.safeParse(request.body);
    if (!body.success) throw new ZodValidationException(body.error);
    request.body = body.data;
    await super.canActivate(context);
    await super.logIn(request);
    return true;
  }
}

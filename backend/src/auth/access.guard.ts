import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import type { Request } from 'express';
import { ForbiddenError } from '../common/errors/app-error.js';
import { ACCESS, type Access } from './access.decorators.js';
import { principalOf } from './principal.js';

/** Stands before every route. Fails closed: a handler without a rule answers 403. */
@Injectable()
export class AccessGuard implements CanActivate {
  constructor(private readonly reflector: Reflector) {}

  canActivate(context: ExecutionContext): boolean {
    const rule = this.reflector.get<Access | undefined>(ACCESS, context.getHandler());
    if (rule === 'public') return true;
    const principal = principalOf(context.switchToHttp().getRequest<Request>());
    if (rule === 'signed-in') return true;
    if (rule === undefined || !principal.permissions.has(rule)) throw new ForbiddenError();
    return true;
  }
}

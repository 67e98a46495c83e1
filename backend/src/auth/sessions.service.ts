import { Injectable } from '@nestjs/common';
import type { Request, Response } from 'express';
import type { Principal } from './principal.js';
import { SessionMiddleware } from './session.middleware.js';

/** Begins and ends sessions on the server's side; a copied cookie is worthless afterwards. */
@Injectable()
export class SessionsService {
  constructor(private readonly middleware: SessionMiddleware) {}

  async end(request: Request, response: Response): Promise<void> {
    await new Promise<void>((resolve, reject) => {
      request.session.destroy((error: unknown) => (error ? reject(error) : resolve()));
    });
    response.clearCookie(this.middleware.cookieName, { path: '/' });
  }

  /** A fresh session id for the person of this request. */
  async renew(request: Request, principal: Principal): Promise<void> {
    await new Promise<void>((resolve, reject) => {
      request.logIn(principal, (error: unknown) => (error ? reject(error) : resolve()));
    });
  }
}

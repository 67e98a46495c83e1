import { Body, Controller, Get, HttpCode, Post, Req, Res, UseGuards } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { SessionDto } from '@stayledger/shared/contracts/auth';
import type { Request, Response } from 'express';
import { ZodResponse } from 'nestjs-zod';
import { GuessableRoute } from '../common/http/throttling.js';
import { Public, SignedIn } from './access.decorators.js';
import { DemoSignInsReply, SessionReply, SignInBody } from './auth.contracts.js';
import { DemoSignInsService } from './demo-sign-ins.service.js';
import { LocalSignInGuard } from './local-sign-in.guard.js';
import { SessionsService } from './sessions.service.js';
import { toSession } from './session.mapper.js';

@ApiTags('auth')
@Controller('auth')
export class AuthController {
  constructor(
    private readonly sessions: SessionsService,
    private readonly demo: DemoSignInsService,
  ) {}

  /** Who is signed in; for signed-out people too, so that the first page needs no failed request. */
  @Get('session')
  @Public()
  @ZodResponse({ type: SessionReply })
  session(@Req() request: Request): SessionDto {
    return toSession(request.user);
  }

  @Post('sign-in')
  @HttpCode(200)
  @Public()
  @GuessableRoute()
  @UseGuards(LocalSignInGuard)
  @ZodResponse({ type: SessionReply, status: 200 })
  signIn(@Req() request: Request, @Body() _body: SignInBody): SessionDto {
    return toSession(request.user);
  }

  @Post('sign-out')
  @HttpCode(204)
  @SignedIn()
  async signOut(@Req() request: Request, @Res({ passthrough: true }) response: Response): Promise<void> {
    await this.sessions.end(request, response);
  }

  /** The demo's accounts with their password; an empty list on every real service. */
  @Get('demo-sign-ins')
  @Public()
  @ZodResponse({ type: DemoSignInsReply })
  demoSignIns() {
    return this.demo.list();
  }
}

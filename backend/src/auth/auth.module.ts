import { Module } from '@nestjs/common';
import { AuthController } from './auth.controller.js';
import { DemoSignInsService } from './demo-sign-ins.service.js';
import { HousekeepingService } from './housekeeping.service.js';
import { LocalStrategy } from './local.strategy.js';
import { PrincipalsService } from './principals.service.js';
import { SessionMiddleware } from './session.middleware.js';
import { SessionSerializer } from './session.serializer.js';
import { SessionsService } from './sessions.service.js';
import { SignInService } from './sign-in.service.js';

@Module({
  controllers: [AuthController],
  providers: [
    DemoSignInsService,
    HousekeepingService,
    LocalStrategy,
    PrincipalsService,
    SessionMiddleware,
    SessionSerializer,
    SessionsService,
    SignInService,
  ],
  exports: [PrincipalsService, SessionMiddleware, SessionsService],
})
export class AuthModule {}

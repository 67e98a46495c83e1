import { Body, Controller, Get, HttpCode, Patch, Post, Query, Req } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { pageQuerySchema } from '@stayledger/shared/contracts/pagination';
import {
  changePasswordSchema,
  updateProfileSchema,
  userPageSchema,
} from '@stayledger/shared/contracts/users';
import type { Request } from 'express';
import { createZodDto, ZodResponse } from 'nestjs-zod';
import { RequirePermission } from '../auth/access.decorators.js';
import { SessionReply } from '../auth/auth.contracts.js';
import { Me, type Principal } from '../auth/principal.js';
import { GuessableRoute } from '../common/http/throttling.js';
import { UsersService } from './users.service.js';

class UpdateProfileBody extends createZodDto(updateProfileSchema) {}
class ChangePasswordBody extends createZodDto(changePasswordSchema) {}
class UserPageQuery extends createZodDto(pageQuerySchema) {}
class UserPageReply extends createZodDto(userPageSchema) {}

@ApiTags('users')
@Controller('users')
export class UsersController {
  constructor(private readonly users: UsersService) {}

  @Get()
  @RequirePermission('users:read')
  @ZodResponse({ type: UserPageReply })
  list(@Query() query: UserPageQuery) {
    return this.users.list(query);
  }

  /** Answers the session as it stands afterwards, since the page shows name and units from there. */
  @Patch('me')
  @RequirePermission('profile:update')
  @ZodResponse({ type: SessionReply })
  updateProfile(@Me() me: Principal, @Body() body: UpdateProfileBody) {
    return this.users.updateProfile(me, body);
  }

  @Post('me/password')
  @HttpCode(204)
  @GuessableRoute()
  @RequirePermission('profile:update')
  async changePassword(@Me() me: Principal, @Body() body: ChangePasswordBody, @Req() request: Request) {
    await this.users.changePassword(me, body, request);
  }
}

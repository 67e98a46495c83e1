import { demoSignInsSchema, sessionSchema, signInSchema } from '@stayledger/shared/contracts/auth';
import { createZodDto } from 'nestjs-zod';

export class SignInBody extends createZodDto(signInSchema) {}
export class SessionReply extends createZodDto(sessionSchema) {}
export class DemoSignInsReply extends createZodDto(demoSignInsSchema) {}

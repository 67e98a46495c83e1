import { Module } from '@nestjs/common';
import { APP_FILTER, APP_GUARD, APP_INTERCEPTOR, APP_PIPE } from '@nestjs/core';
import { ScheduleModule } from '@nestjs/schedule';
import { ThrottlerGuard } from '@nestjs/throttler';
import { ZodSerializerInterceptor, ZodValidationPipe } from 'nestjs-zod';
import { AuditModule } from './audit/audit.module.js';
import { AccessGuard } from './auth/access.guard.js';
import { AuthModule } from './auth/auth.module.js';
import { ClockModule } from './common/clock/clock.module.js';
import { ErrorFilter } from './common/errors/error.filter.js';
import { ThrottlingModule } from './common/http/throttling.js';
import { IdempotencyInterceptor } from './common/idempotency/idempotency.interceptor.js';
import { ConfigModule } from './config/config.module.js';
import { ConstructionsModule } from './constructions/constructions.module.js';
import { CurveSpreadModule } from './curve-spread/curve-spread.module.js';
import { CurvesModule } from './curves/curves.module.js';
import { PersistenceModule } from './database/persistence.module.js';
import { ReachInterceptor } from './database/reach.interceptor.js';
import { DetailChoicesModule } from './detail-choices/detail-choices.module.js';
import { FirmsModule } from './firms/firms.module.js';
import { HealthModule } from './health/health.module.js';
import { JobsModule } from './jobs/jobs.module.js';
import { LedgerModule } from './ledger/ledger.module.js';
import { LifeModule } from './life/life.module.js';
import { LoadLogsModule } from './load-logs/load-logs.module.js';
import { PartsModule } from './parts/parts.module.js';
import { PositionHistoryModule } from './position-history/position-history.module.js';
import { RerigSchedulesModule } from './rerig-schedules/rerig-schedules.module.js';
import { RigCopiesModule } from './rig-copies/rig-copies.module.js';
import { RigModule } from './rig/rig.module.js';
import { SensorsModule } from './sensors/sensors.module.js';
import { UsersModule } from './users/users.module.js';
import { VesselsModule } from './vessels/vessels.module.js';

/** The API. What stands around every route, from the outside in, then the features. */
@Module({
  imports: [
    ConfigModule,
    ClockModule,
    PersistenceModule,
    ThrottlingModule,
    ScheduleModule.forRoot(),
    AuditModule,
    AuthModule,
    ConstructionsModule,
    CurveSpreadModule,
    CurvesModule,
    DetailChoicesModule,
    FirmsModule,
    HealthModule,
    JobsModule,
    LedgerModule,
    LifeModule,
    LoadLogsModule,
    PartsModule,
    PositionHistoryModule,
    RerigSchedulesModule,
    RigCopiesModule,
    RigModule,
    SensorsModule,
    UsersModule,
    VesselsModule,
  ],
  providers: [
    { provide: APP_FILTER, useClass: ErrorFilter },
    { provide: APP_GUARD, useClass: ThrottlerGuard },
    { provide: APP_GUARD, useClass: AccessGuard },
    { provide: APP_INTERCEPTOR, useClass: ReachInterceptor },
    { provide: APP_INTERCEPTOR, useClass: IdempotencyInterceptor },
    { provide: APP_INTERCEPTOR, useClass: ZodSerializerInterceptor },
    { provide: APP_PIPE, useClass: ZodValidationPipe },
  ],
})
export class AppModule {}

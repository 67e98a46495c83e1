import { Module, SetMetadata } from '@nestjs/common';
import { ThrottlerModule, type ThrottlerModuleOptions } from '@nestjs/throttler';

const GUESSABLE = 'stayledger:guessable';

/** Marks a route where somebody might guess a password: fewer requests per minute from one address. */
export const GuessableRoute = () => SetMetadata(GUESSABLE, true);

/** Injection token of the limits per address (IP) and minute. */
export const THROTTLE_LIMITS = Symbol('THROTTLE_LIMITS');
export interface ThrottleLimits {
  perMinute: number;
  guessesPerMinute: number;
}

/** A page polls once a second and loads a dozen things at once; a boat yard shares one address. */
const LIMITS: ThrottleLimits = { perMinute: 1200, guessesPerMinute: 20 };

@Module({
  providers: [{ provide: THROTTLE_LIMITS, useValue: LIMITS }],
  exports: [THROTTLE_LIMITS],
})
class ThrottleLimitsModule {}

@Module({
  imports: [
    ThrottlerModule.forRootAsync({
      imports: [ThrottleLimitsModule],
      inject: [THROTTLE_LIMITS],
      useFactory: (limits: ThrottleLimits): ThrottlerModuleOptions => [
        { name: 'all', ttl: 60_000, limit: limits.perMinute },
        {
          name: 'guesses',
          ttl: 60_000,
          limit: limits.guessesPerMinute,
          skipIf: (context) => Reflect.getMetadata(GUESSABLE, context.getHandler()) !== true,
        },
      ],
    }),
  ],
  exports: [ThrottlerModule],
})
export class ThrottlingModule {}

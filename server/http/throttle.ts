import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible';
import { Problem } from './problem.ts';

/** Counts failures before a password is hashed, so that guessing costs the guesser and not the server. */
export type Throttle = {
  /** @throws Problem `too many` while any of the keys has used up its tries. */
  readonly requireLeft: (...keys: string[]) => Promise<void>;
  readonly countFailure: (...keys: string[]) => Promise<void>;
  readonly forgive: (...keys: string[]) => Promise<void>;
};

export function createThrottle(options: {
  readonly tries: number;
  readonly perSeconds: number;
  readonly what: string;
}): Throttle {
  const limiter = new RateLimiterMemory({ points: options.tries, duration: options.perSeconds });
  return {
    requireLeft: async (...keys) => {
      for (const key of keys) {
        const state = await limiter.get(key);
        if (!(state instanceof RateLimiterRes) || state.remainingPoints > 0) continue;
        const minutes = Math.ceil(state.msBeforeNext / 60_000);
        throw new Problem(
          'too many',
          `Too many wrong passwords for ${options.what}. Wait ${minutes} ${minutes === 1 ? 'minute' : 'minutes'} and try again.`,
        );
      }
    },
    countFailure: async (...keys) => {
      // A rejection only says that the tries are used up, which `requireLeft` reports next time.
      for (const key of keys) await limiter.consume(key).catch(() => undefined);
    },
    forgive: async (...keys) => {
      for (const key of keys) await limiter.delete(key);
    },
  };
}

import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible';
import { Problem } from '../db/problem.ts';

/** Counts tries before a password is hashed, so that guessing costs the guesser and not the server. */
export type Throttle = {
  /**
   * Takes one try of each key, before anything is awaited: of many requests at once no more get through than tries
   * are left. `giveBack` once it turns out that the try was no guess.
   *
   * @throws Problem `too many` when any of the keys has none left.
   */
  readonly take: (...keys: string[]) => Promise<void>;
  readonly giveBack: (...keys: string[]) => Promise<void>;
  readonly forgive: (...keys: string[]) => Promise<void>;
};

export function createThrottle(options: {
  readonly tries: number;
  readonly perSeconds: number;
  /** For whom or what, in the sentence of the refusal. */
  readonly what: string;
  /** What was tried; wrong passwords unless said otherwise. */
  readonly of?: string;
}): Throttle {
  const limiter = new RateLimiterMemory({ points: options.tries, duration: options.perSeconds });
  const tooMany = (state: RateLimiterRes) => {
    const minutes = Math.max(1, Math.ceil(state.msBeforeNext / 60_000));
    const wait = `${minutes} ${minutes === 1 ? 'minute' : 'minutes'}`;
    return new Problem(
      'too many',
      `Too many ${options.of ?? 'wrong passwords'} for ${options.what}. Wait ${wait} and try again.`,
    );
  };
  return {
    take: async (...keys) => {
      const taken = await Promise.allSettled(keys.map((key) => limiter.consume(key)));
      for (const outcome of taken) {
        if (outcome.status === 'rejected' && outcome.reason instanceof RateLimiterRes) throw tooMany(outcome.reason);
        if (outcome.status === 'rejected') throw outcome.reason;
      }
    },
    giveBack: async (...keys) => {
      for (const key of keys) await limiter.reward(key);
    },
    forgive: async (...keys) => {
      for (const key of keys) await limiter.delete(key);
    },
  };
}

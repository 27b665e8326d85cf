import { hash, verify } from '@node-rs/argon2';

/** OWASP's minimum for Argon2id: 19 MiB, two passes, one lane. */
const parameters = { algorithm: 2 /* Argon2id */, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

/** Hashing fills the thread pool, so more than two at once would stall everything else. */
const mostAtOnce = 2;
let running = 0;
const waiting: (() => void)[] = [];

async function oneOfFew<Result>(work: () => Promise<Result>): Promise<Result> {
  if (running >= mostAtOnce) await new Promise<void>((resolve) => waiting.push(resolve));
  else running += 1;
  try {
    return await work();
  } finally {
    const next = waiting.shift();
    if (next) next();
    else running -= 1;
  }
}

/** Argon2id in PHC notation. */
export function hashPassword(password: string): Promise<string> {
  return oneOfFew(() => hash(password.normalize('NFKC'), parameters));
}

// Hash of a random text: an unknown address must cost as much time as a known one.
const nobody = '$argon2id$v=19$m=19456,t=2,p=1$c29tZXNhbHRzb21lc2FsdA$7vLkmAhEiXbGV1iw2c6SHRiDgwkZnrT2v1V0GJtJ8l0';

/** Whether the password is the person's; with no hash it takes as long and answers no. */
export function passwordMatches(storedHash: string | null, password: string): Promise<boolean> {
  return oneOfFew(async () => {
    const matches = await verify(storedHash ?? nobody, password.normalize('NFKC'));
    return storedHash !== null && matches;
  });
}

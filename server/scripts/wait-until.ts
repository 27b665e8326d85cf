/**
 * Asks again and again until the answer is yes.
 *
 * @param isDone - Throws to give up at once.
 * @param timeoutMs - Milliseconds until the promise is rejected with `tooLate`.
 */
export async function waitUntil(
  isDone: () => boolean | Promise<boolean>,
  { timeoutMs, tooLate, everyMs = 50 }: { timeoutMs: number; tooLate: () => string; everyMs?: number },
): Promise<void> {
  const deadline = Date.now() + timeoutMs;
  while (!(await isDone())) {
    if (Date.now() > deadline) throw new Error(tooLate());
    await new Promise((resolve) => setTimeout(resolve, everyMs));
  }
}

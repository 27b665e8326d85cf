import { runTests } from './run-tests.ts';
import { sentenceOf } from './sentence-of.ts';

process.exitCode = await runTests(process.argv.slice(2)).catch((error: unknown) => {
  process.stderr.write(`${sentenceOf(error)}\n`);
  return 1;
});

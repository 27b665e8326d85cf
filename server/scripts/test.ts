import { runTests } from './run-tests.ts';

process.exitCode = await runTests(process.argv.slice(2));

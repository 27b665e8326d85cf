import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parseFormula } from '../../../shared/engine/formula/parse-formula.ts';
import { findMethod, methods } from '../../../shared/engine/methods/catalogue.ts';
import type { Method } from '../../../shared/engine/methods/method.ts';

type Facts = {
  readonly method: string;
  readonly records: readonly {
    readonly id: string;
    readonly inputs: Readonly<Record<string, number>>;
    readonly expected: number;
    readonly relativeTolerance: number;
    readonly inRange: boolean;
    readonly outOfRangeBecause: readonly string[];
    readonly source: string;
  }[];
};

const folder = join(import.meta.dirname, '../../reference/methods');
const all = readdirSync(folder).map((file): Facts => JSON.parse(readFileSync(join(folder, file), 'utf8')));

function valueAt(method: Method, inputs: Readonly<Record<string, number>>): number {
  const read = parseFormula(method.expression);
  if (!read.ok) throw new Error(read.reason);
  return read.formula.evaluate(read.formula.variables.map((name) => inputs[name] ?? Number.NaN)).value;
}

/** The limits of the window that these inputs break; a limit on a length ratio is read from its variable. */
function brokenLimits(method: Method, inputs: Readonly<Record<string, number>>): string[] {
  return method.window.flatMap(({ group, min, max, expression }) => {
    const read = parseFormula(expression ?? group.replaceAll('/', '_over_'));
    if (!read.ok) throw new Error(read.reason);
    const value = read.formula.evaluate(read.formula.variables.map((name) => inputs[name] ?? Number.NaN)).value;
    if (Number.isNaN(value)) return [];
    return (min !== null && value < min) || (max !== null && value > max) ? [group] : [];
  });
}

describe.each(all)('$method', ({ method: id, records }) => {
  const method = findMethod(id);
  if (!method) throw new Error(`The library has no method ${id}.`);

  it.each(records.map((record) => [record.id, record] as const))(
    'gives the value of the published form %s',
    (_, record) => {
      const relative = Math.abs(valueAt(method, record.inputs) / record.expected - 1);

      expect(relative).toBeLessThanOrEqual(record.relativeTolerance);
    },
  );

  it.each(records.map((record) => [record.id, record] as const))('knows whether %s lies in its window', (_, record) => {
    const broken = brokenLimits(method, record.inputs);

    if (record.inRange) expect(broken).toEqual([]);
    else expect(broken.length, record.outOfRangeBecause.join('; ')).toBeGreaterThan(0);
  });
});

describe('every method of the library', () => {
  it('has an id of its own', () => {
    expect(new Set(methods.map((method) => method.id)).size).toBe(methods.length);
  });

  it.each(methods.map((method) => [method.id, method] as const))('%s gives its own check values', (_, method) => {
    expect(method.checks.length).toBeGreaterThan(0);
    for (const check of method.checks) {
      expect(Math.abs(valueAt(method, check.given) / check.gives - 1)).toBeLessThanOrEqual(check.relativeTolerance);
    }
  });

  it.each(methods.map((method) => [method.id, method] as const))(
    '%s names the variables of its formula',
    (_, method) => {
      const read = parseFormula(method.expression);

      expect(read.ok && [...read.formula.variables].sort()).toEqual(Object.keys(method.variables).sort());
    },
  );
});

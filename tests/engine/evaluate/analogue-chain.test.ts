import { describe, expect, it } from 'vitest';
import { checkModel } from '../../../shared/engine/evaluate/check-model.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { studyEvaluationSchema } from '../../../shared/engine/model/evaluation.ts';
import { studyModelSchema } from '../../../shared/engine/model/study-model.ts';
import {
  analogueChain,
  analogueInputIds,
  expectedAnalogueChain as expected,
  analogueChainIds as ids,
} from '../../reference/analogue-chain.ts';

const relatively = (actual: number | undefined, wanted: number | undefined) =>
  Math.abs((actual ?? Number.NaN) / (wanted ?? Number.NaN) - 1);

describe('the whole chain from a heated cylinder to a dissolution time', () => {
  const evaluation = evaluateStudy(analogueChain());

  it('is a study the schema and the structural checks accept', () => {
    expect(studyModelSchema.parse(analogueChain())).toEqual(analogueChain());
    expect(checkModel(analogueChain())).toEqual([]);
  });

  it.each([
    ['k', ids.massTransferCoefficient],
    ['t', ids.dissolutionTime],
  ] as const)('gives %s and its uncertainty as the independent implementation does', (name, quantityId) => {
    const result = evaluation.quantities[quantityId]?.result;

    expect(relatively(result?.value, expected[name].value)).toBeLessThan(expected.relativeTolerance);
    expect(relatively(result?.u, expected[name].u)).toBeLessThan(expected.relativeTolerance);
  });

  it.each([
    ['k', ids.massTransferCoefficient],
    ['t', ids.dissolutionTime],
  ] as const)(
    'splits the variance of %s among its inputs as the independent implementation does',
    (name, quantityId) => {
      const result = evaluation.quantities[quantityId]?.result;
      const uncorrelated = (result?.budget ?? []).reduce((sum, line) => sum + line.share, 0);
      const shares = Object.fromEntries(
        (result?.budget ?? []).map((line) => [line.inputId, line.share / uncorrelated]),
      );

      for (const [input, share] of Object.entries(expected[name].variance_share)) {
        // The shares are printed with four digits, of the sum without the correlated part; what is below 1e-15 cancels and is no line of the budget.
        const found = shares[analogueInputIds[input] ?? ''] ?? 0;
        if (share < 1e-15) expect(found).toBe(0);
        else expect(relatively(found, share)).toBeLessThan(1e-3);
      }
    },
  );

  it('lists the steps of the analogy with their values and uncertainties', () => {
    const steps = evaluation.routes[ids.analogueRoute]?.steps ?? [];
    const names = { Nu: 'Nu_s', Re_m: 'Re_s', Re_p: 'Re_t', Sc: 'Sc_t', Sh: 'Sh_t' };

    for (const [name, symbol] of Object.entries(names)) {
      const wanted = expected.steps.find((step) => step.name === name);
      const found = steps.find((step) => step.symbol === symbol);
      expect(relatively(found?.value, wanted?.value)).toBeLessThan(1e-6);
      expect(relatively(found?.u, wanted?.u)).toBeLessThan(1e-5);
    }
  });

  it('finds Re, Pr, Sc and the geometry matched', () => {
    const checks = evaluation.routes[ids.analogueRoute]?.checks ?? [];
    const verdicts = Object.fromEntries(checks.map((check) => [check.key, check.verdict]));

    expect(verdicts).toMatchObject({
      'match:Re': 'inside',
      'window:Pr': 'inside',
      'window:Sc': 'inside',
      'geometry:family': 'inside',
      'geometry:L/d': 'inside',
      'regime:Re': 'inside',
    });
  });

  it('is an evaluation the schema accepts, with every budget summing to one', () => {
    expect(studyEvaluationSchema.parse(evaluation)).toEqual(evaluation);
    for (const { result } of Object.values(evaluation.routes)) {
      const sum = (result?.budget ?? []).reduce((total, line) => total + line.share, result?.correlatedShare ?? 0);
      expect(sum).toBeCloseTo(1, 12);
    }
  });
});

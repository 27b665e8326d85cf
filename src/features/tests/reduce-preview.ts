import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import type { StudyEvaluation } from '../../../shared/engine/model/evaluation.ts';
import type { StudyModel, Test } from '../../../shared/engine/model/study-model.ts';
import { summariseReadings } from '../../../shared/engine/reductions/steady-heating.ts';
import { readReadings } from '../../../shared/readings/read-readings.ts';
import { type ReadingsMapping, readingsMappingSchema } from '../../../shared/readings/readings.ts';

export type Reduction = Omit<Test['reduction'], 'summary'>;
export type ReadFile = ReturnType<typeof readReadings>;

/** Reads with the columns chosen so far; null while one that is needed has no column or no unit. */
export function readWith(
  text: string,
  mapping: Partial<ReadingsMapping>,
): { readonly mapping: ReadingsMapping; readonly file: ReadFile } | null {
  const whole = readingsMappingSchema.safeParse({ time: null, ...mapping });
  if (!whole.success || text.trim() === '') return null;
  return { mapping: whole.data, file: readReadings(text, whole.data) };
}

export type Preview = {
  readonly result: StudyEvaluation['tests'][string] | undefined;
  readonly sentences: readonly string[];
};

const zeroHash = '0'.repeat(64);

/**
 * The reduction that the server will run, on the readings on screen: the same engine with the same study, to which
 * the test is added in memory only.
 */
export function previewReduction(
  model: StudyModel,
  test: {
    readonly id: string;
    readonly name: string;
    readonly operatingPointId: string;
    readonly performedOn: string | null;
  },
  readings: Parameters<typeof summariseReadings>[0],
  reduction: Reduction,
): Preview {
  const whole: Test = {
    ...test,
    reduction: { ...reduction, summary: summariseReadings(readings) },
    file: { id: test.id, name: test.name, sha256: zeroHash, bytes: 0 },
  };
  const evaluation = evaluateStudy({ ...model, tests: [...model.tests, whole] });
  return {
    result: evaluation.tests[test.id],
    sentences: evaluation.findings
      .filter((finding) => finding.subject.id === test.id)
      .map((finding) => finding.sentence),
  };
}

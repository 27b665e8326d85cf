import type { StudyEvaluation } from '../../../shared/engine/model/evaluation.ts';
import { BudgetBars } from '../../charts/BudgetBars.tsx';
import { plainNumber } from '../../charts/plain-number.ts';
import { Measured } from '../../ui/Measured.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';

/** h and the velocity with what scatter and what instruments contribute, or why they cannot be given. */
export function ReducedValues({
  result,
  sentences,
}: {
  readonly result: StudyEvaluation['tests'][string] | undefined;
  readonly sentences: readonly string[];
}) {
  const h = result?.heatTransferCoefficient ?? null;
  const velocity = result?.velocity ?? null;
  return (
    <div className="grid gap-3">
      <div aria-live="polite" className="grid gap-2 border-2 border-rule bg-surface p-4">
        {h ? (
          <>
            <p className="text-lg">
              <Symbol_ symbol="h" /> = <Measured value={h.value} u={h.u} unit="W/(m² K)" />
            </p>
            <p className="text-sm">
              Type A, from the scatter: u = <span className="num">{plainNumber(result?.typeA ?? 0)} W/(m² K)</span>.
              Type B, from instruments, heat loss and surface: u ={' '}
              <span className="num">{plainNumber(result?.typeB ?? 0)} W/(m² K)</span>.
            </p>
          </>
        ) : (
          <p className="font-semibold">These readings give no h.</p>
        )}
        {velocity && (
          <p className="text-sm">
            <Symbol_ symbol="u" /> = <Measured value={velocity.value} u={velocity.u} unit="m/s" />, the velocity that
            goes with it
          </p>
        )}
        {sentences.map((sentence) => (
          <p key={sentence} className="border-l-4 border-warn pl-3 text-sm">
            {sentence}
          </p>
        ))}
      </div>
      {h && (
        <div className="max-w-xl">
          <BudgetBars result={h} unit="W/(m² K)" />
        </div>
      )}
    </div>
  );
}

import type { Scale } from '../../shared/engine/model/study-model.ts';
import { useChain } from './chain-context.ts';
import { AddQuantity } from './inspector/OverviewPanel.tsx';

const steps = [
  'Say which number the plant needs, with its unit.',
  'Describe the plant and the rig as operating points: length, velocity, properties. Re, Pr and Sc follow.',
  'Upload the readings of the rig; h and its uncertainty come out.',
  'Link h to the number the plant needs, add a second route, and compare.',
];

/** What a new study shows instead of a blank sheet. */
export function EmptyChain() {
  const { mayEdit } = useChain();
  const scale: Scale = 'plant';
  return (
    <div className="grid h-full content-start justify-items-center relative overflow-y-auto bg-paper px-4 py-10">
      <div className="grid w-full max-w-xl gap-4 border-2 border-rule bg-surface p-6">
        <h2 className="text-xl leading-tight font-bold">Start from the quantity the plant needs</h2>
        {mayEdit.allowed ? (
          <>
            <ol className="grid list-decimal gap-1 pl-5 text-sm">
              {steps.map((step) => (
                <li key={step}>{step}</li>
              ))}
            </ol>
            <AddQuantity scale={scale} />
          </>
        ) : (
          <p className="text-sm">Nothing is in this study yet. {mayEdit.reason}</p>
        )}
      </div>
    </div>
  );
}

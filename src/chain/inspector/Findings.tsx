import type { Finding } from '../../../shared/engine/model/evaluation.ts';
import { useChain } from '../chain-context.ts';
import { findItem } from '../editing/chain-edits.ts';
import { smallButton } from './fields.tsx';

const tone = { stops: 'border-bad', warns: 'border-warn', tells: 'border-info' } as const;
const words = { stops: 'Stops', warns: 'Mind', tells: 'Note' } as const;

/** What the engine found about one thing, or about everything, with a way to where it is mended. */
export function FindingList({
  findings,
  from,
}: {
  readonly findings: readonly Finding[];
  readonly from: string | null;
}) {
  const { state, select } = useChain();
  if (findings.length === 0) return null;
  return (
    <ul className="grid gap-1.5" aria-label="Findings">
      {findings.map((finding) => {
        const item = findItem(state.model, finding.subject.id);
        const name = item && 'name' in item.body ? item.body.name : null;
        return (
          <li
            key={`${finding.code}:${finding.subject.id}:${finding.sentence}`}
            className={`grid gap-1 border-l-4 bg-surface px-3 py-1.5 text-sm ${tone[finding.severity]}`}
          >
            <span>
              <b className="font-semibold">{words[finding.severity]}:</b> {finding.sentence}
            </span>
            {name && finding.subject.id !== from && finding.subject.kind !== 'test' && (
              <span>
                <button type="button" className={smallButton} onClick={() => select(finding.subject.id)}>
                  Go to {name}
                </button>
              </span>
            )}
          </li>
        );
      })}
    </ul>
  );
}

export function Findings({ kind, id }: { readonly kind: Finding['subject']['kind']; readonly id: string }) {
  const { evaluation } = useChain();
  return (
    <FindingList
      findings={evaluation.findings.filter((finding) => finding.subject.kind === kind && finding.subject.id === id)}
      from={id}
    />
  );
}

import type { RouteResult } from '../../../shared/engine/model/evaluation.ts';
import type { Route } from '../../../shared/engine/model/study-model.ts';
import { LogWindow, VerdictMark } from '../../charts/LogWindow.tsx';
import { useChain, useEdit } from '../chain-context.ts';
import { Section, TextField } from './fields.tsx';

/** Per group: both ends of the link, the window, and the verdict in words. */
export function MatchStrip({ result }: { readonly result: RouteResult }) {
  if (result.checks.length === 0) return null;
  const inside = result.checks.filter((check) => check.verdict === 'inside').length;
  return (
    <Section
      title="Match checks"
      aside={
        <span className="text-xs text-ink-2">
          {inside} of {result.checks.length} inside
        </span>
      }
    >
      {result.checks.map((check) => (
        <LogWindow key={check.key} check={check} />
      ))}
    </Section>
  );
}

/** What the route assumes, what stands behind each assumption, and the engineer's words where checks do not carry it. */
export function Assumptions({
  route,
  result,
  locked,
}: {
  readonly route: Route;
  readonly result: RouteResult;
  readonly locked: boolean;
}) {
  const edit = useEdit();
  const { document } = useChain();
  if (result.assumptions.length === 0) return null;
  const open = result.assumptions.filter(
    (assumption) => assumption.needsJustification && !route.justifications[assumption.key]?.trim(),
  ).length;
  return (
    <Section
      title="Assumptions"
      aside={
        <span className="text-xs text-ink-2">
          {open === 0 ? 'all answered' : `${open} of ${result.assumptions.length} to justify`}
        </span>
      }
    >
      <ul className="grid gap-3">
        {result.assumptions.map((assumption) => (
          <li key={assumption.key} className="grid gap-1 border-b border-hair pb-2 text-sm">
            <p className="flex items-start justify-between gap-2">
              <span>{assumption.statement}</span>
              {assumption.verdict === 'by judgement' ? (
                <span className="text-xs whitespace-nowrap text-ink-2">by judgement</span>
              ) : (
                <span className="text-xs">
                  <VerdictMark verdict={assumption.verdict} />
                </span>
              )}
            </p>
            {assumption.verdict !== 'inside' && (
              <p className="text-xs text-ink-2">If it fails: {assumption.ifItFails}</p>
            )}
            {(assumption.needsJustification || route.justifications[assumption.key]) && (
              <TextField
                label={`Why it holds here: ${assumption.statement}`}
                multiline
                value={route.justifications[assumption.key] ?? ''}
                disabled={locked}
                hint={assumption.needsJustification ? 'Needed before the route can be submitted.' : undefined}
                onSettle={() => document.seal()}
                onChange={(text) =>
                  edit(
                    [
                      {
                        kind: 'route',
                        id: route.id,
                        body: { ...route, justifications: { ...route.justifications, [assumption.key]: text } },
                      },
                    ],
                    `Justified an assumption of ${route.name}`,
                    `justification:${route.id}:${assumption.key}`,
                  )
                }
              />
            )}
          </li>
        ))}
      </ul>
    </Section>
  );
}

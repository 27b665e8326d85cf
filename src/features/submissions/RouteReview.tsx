import type { Submission } from '../../../shared/api/submissions.ts';
import { findMethod } from '../../../shared/engine/methods/catalogue.ts';
import type { Route } from '../../../shared/engine/model/study-model.ts';
import { typesetUnit } from '../../../shared/engine/quantity/format-measured.ts';
import { BudgetBars } from '../../charts/BudgetBars.tsx';
import { Measured } from '../../ui/Measured.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { AssumptionRuling } from './AssumptionRuling.tsx';

const kindNames: Record<Route['kind'], string> = {
  'stated-value': 'stated value',
  'test-result': 'test result',
  'heat-analogue': 'measured heat analogue',
  correlation: 'correlation',
  balance: 'balance',
};

/** One route of the package: what it rests on, what it gives, and its assumptions to rule on. */
export function RouteReview({ submission, routeId }: { readonly submission: Submission; readonly routeId: string }) {
  const { model, evaluation } = submission.snapshot;
  const route = model.routes.find((one) => one.id === routeId);
  const quantity = model.quantities.find((one) => one.id === route?.quantityId);
  const outcome = evaluation.routes[routeId];
  if (!route || !quantity || !outcome) return null;
  const method = route.kind === 'correlation' ? findMethod(route.methodId) : undefined;
  return (
    <section aria-label={`${quantity.name}: ${route.name}`} className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <div className="border-b border-rule pb-1">
        <h2 className="text-lg font-bold">
          <Symbol_ symbol={quantity.symbol} /> {quantity.name}
        </h2>
        <p className="text-sm text-ink-2">
          {route.name}, {kindNames[route.kind]}
          {outcome.result && (
            <>
              : <Measured value={outcome.result.value} u={outcome.result.u} unit={quantity.unit} />
            </>
          )}
        </p>
      </div>
      {route.rationale && <p>{route.rationale}</p>}
      {route.kind === 'stated-value' && <p>Evidence: {route.evidence || 'none given'}</p>}
      {route.kind === 'balance' && (
        <p>
          Formula: <span className="num">{route.expression}</span>
        </p>
      )}
      {method && (
        <p className="text-sm">
          {method.source}.{' '}
          {method.status === 'from memory' && (
            <strong className="text-warn">
              Constants and limits were written from memory; look them up before use.
            </strong>
          )}
        </p>
      )}
      {outcome.steps.length > 0 && (
        <details>
          <summary className="min-h-7 cursor-pointer text-sm text-primary underline">
            Steps between inputs and result
          </summary>
          <ul className="grid gap-1 py-1 text-sm">
            {outcome.steps.map((step) => (
              <li key={`${step.symbol} ${step.meaning}`}>
                <Symbol_ symbol={step.symbol} /> ={' '}
                <Measured value={step.value} u={step.u} unit={typesetUnit(step.unit)} />,{' '}
                <span className="text-ink-2">{step.meaning}</span>
              </li>
            ))}
          </ul>
        </details>
      )}
      {outcome.result && outcome.result.budget.length > 0 && (
        <details>
          <summary className="min-h-7 cursor-pointer text-sm text-primary underline">Uncertainty budget</summary>
          <BudgetBars result={outcome.result} unit={quantity.unit} />
        </details>
      )}
      <ul className="grid gap-3">
        {outcome.assumptions.map((assumption) => (
          <AssumptionRuling
            key={assumption.key}
            submission={submission}
            routeId={routeId}
            assumption={assumption}
            checks={outcome.checks.filter((check) => assumption.checkKeys.includes(check.key))}
            justification={route.justifications[assumption.key] ?? ''}
          />
        ))}
      </ul>
    </section>
  );
}

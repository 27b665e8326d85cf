import { formatMeasured } from '../../shared/engine/quantity/format-measured.ts';

/** A value ± U (k = 2), typeset, with words for who listens. SI in; shown in the given unit. */
export function Measured({ value, u, unit }: { readonly value: number; readonly u: number; readonly unit: string }) {
  const shown = formatMeasured(value, u, unit);
  if (shown.text === 'no value') return <span className="text-ink-2">no value</span>;
  const isPair = shown.expanded !== '';
  const needsBrackets = isPair && (shown.exponent !== null || shown.unit !== '');
  return (
    <span className="num">
      {needsBrackets && '('}
      {shown.mantissa}
      {isPair && (
        <>
          <span aria-hidden="true"> ± </span>
          <span className="sr-only"> plus or minus </span>
          {shown.expanded}
        </>
      )}
      {needsBrackets && ')'}
      {shown.exponent !== null && (
        <>
          <span aria-hidden="true">
            {' '}
            × 10<sup>{String(shown.exponent).replace('-', '−')}</sup>
          </span>
          <span className="sr-only"> times ten to the {String(shown.exponent).replace('-', 'minus ')}</span>
        </>
      )}
      {shown.unit !== '' && <span className="font-normal text-ink-2"> {shown.unit}</span>}
    </span>
  );
}

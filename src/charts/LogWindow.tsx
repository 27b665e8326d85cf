import { scaleLog } from 'd3-scale';
import type { MatchCheck, Verdict } from '../../shared/engine/model/evaluation.ts';
import { plainNumber } from './plain-number.ts';

const width = 260;
const left = 8;
const right = width - 8;
const axisY = 22;

const verdictTone: Record<Verdict, string> = {
  inside: 'text-ok',
  'near the edge': 'text-warn',
  outside: 'text-bad',
  'not evaluated': 'text-ink-2',
};
const verdictGlyph: Record<Verdict, string> = {
  inside: 'M2 7 l3.5 4 L12 3',
  'near the edge': 'M7 2 L13 12 H1 Z M7 6 v3 M7 10.3 v.6',
  outside: 'M1 8 L4 8 L6 2 L8 12 L10 6 L13 6',
  'not evaluated': 'M3 7 h8',
};

/** Verdict as glyph and word, so that colour never carries it alone. */
export function VerdictMark({ verdict, words }: { readonly verdict: Verdict; readonly words?: string }) {
  return (
    <span className={`inline-flex items-center gap-1 font-semibold whitespace-nowrap ${verdictTone[verdict]}`}>
      <svg
        viewBox="0 0 14 14"
        className="size-3.5 shrink-0"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.6"
        aria-hidden="true"
      >
        <path d={verdictGlyph[verdict]} />
      </svg>
      {words ?? verdict}
    </span>
  );
}

/** The window in the unit of the axis: for a match it is one of the ratio, so it stands around the source. */
function shownWindow(check: MatchCheck): { readonly min: number | null; readonly max: number | null } | null {
  if (!check.window) return null;
  if (check.kind !== 'match') return check.window;
  if (check.source === null) return null;
  const { min, max } = check.window;
  return { min: min === null ? null : min * check.source, max: max === null ? null : max * check.source };
}

/** Decades around everything the axis must show; null where a logarithm has no meaning. */
export function logDomain(check: MatchCheck): [number, number] | null {
  const window = shownWindow(check);
  const marks = [check.source, check.target, window?.min ?? null, window?.max ?? null].filter(
    (x): x is number => x !== null && Number.isFinite(x) && x > 0,
  );
  const shown = [check.source, check.target].filter((x) => x !== null);
  if (marks.length === 0 || shown.some((x) => x <= 0 || !Number.isFinite(x))) return null;
  const low = Math.min(...marks) / 2;
  const high = Math.max(...marks) * 2;
  return [low, high];
}

const noWindowWords: Record<MatchCheck['kind'], string> = {
  match: 'equal at both ends',
  geometry: 'equal at both ends',
  regime: 'the same regime at both ends',
  window: 'no window stated',
};

function windowWords(check: MatchCheck): string {
  if (!check.window) return noWindowWords[check.kind];
  const { min, max, basis } = check.window;
  const range =
    min !== null && max !== null
      ? `${plainNumber(min)} to ${plainNumber(max)}`
      : min !== null
        ? `at least ${plainNumber(min)}`
        : max !== null
          ? `at most ${plainNumber(max)}`
          : 'no limits';
  return `${check.kind === 'match' ? 'ratio' : 'window'} ${range}, ${basis}`;
}

function Axis({ check, domain }: { readonly check: MatchCheck; readonly domain: [number, number] }) {
  const x = scaleLog().domain(domain).range([left, right]).clamp(true);
  const firstDecade = Math.ceil(Math.log10(domain[0]));
  const decades = Array.from(
    { length: Math.max(0, Math.floor(Math.log10(domain[1])) - firstDecade + 1) },
    (_, i) => 10 ** (firstDecade + i),
  );
  const window = shownWindow(check);
  const from = window ? x(Math.max(window.min ?? domain[0], domain[0])) : null;
  const to = window ? x(Math.min(window.max ?? domain[1], domain[1])) : null;
  const source = check.source === null ? null : x(check.source);
  const target = check.target === null ? null : x(check.target);
  return (
    <svg viewBox={`0 0 ${width} 34`} className="w-full max-w-80" role="img" aria-label={check.sentence}>
      {from !== null && to !== null && (
        <>
          <rect x={from} y={axisY - 9} width={Math.max(2, to - from)} height={9} fill="var(--sunk)" />
          <line x1={from} x2={to} y1={axisY} y2={axisY} stroke="var(--ink)" strokeWidth="4" />
        </>
      )}
      <line x1={left} x2={right} y1={axisY} y2={axisY} stroke="var(--line)" />
      {[left, right].map((end) => (
        <line key={end} x1={end} x2={end} y1={axisY - 4} y2={axisY + 4} stroke="var(--line)" />
      ))}
      {decades.map((decade) => (
        <line key={decade} x1={x(decade)} x2={x(decade)} y1={axisY} y2={axisY + 6} stroke="var(--line)" />
      ))}
      {source !== null && (
        <circle cx={source} cy={axisY - 10} r="4" fill="var(--surface)" stroke="var(--ink)" strokeWidth="1.8" />
      )}
      {target !== null && <path d={`M${target - 5} ${axisY - 15} h10 l-5 9 Z`} fill="var(--primary)" />}
    </svg>
  );
}

/**
 * One match check on a logarithmic axis: the window as a bar, the source as a ring, the target as a triangle,
 * and beside them the same in words.
 */
export function LogWindow({ check }: { readonly check: MatchCheck }) {
  const domain = logDomain(check);
  return (
    <figure className="grid gap-x-3 gap-y-0.5 border-b border-hair py-2">
      <figcaption className="flex flex-wrap items-baseline justify-between gap-x-3">
        <span>
          <span className="sym text-base">{check.group}</span>
          <span className="ml-2 text-xs text-ink-2">{windowWords(check)}</span>
        </span>
        <VerdictMark verdict={check.verdict} />
      </figcaption>
      {domain && <Axis check={check} domain={domain} />}
      <p className="num flex flex-wrap gap-x-3 text-xs text-ink-2">
        {check.source !== null && <span>○ source {plainNumber(check.source)}</span>}
        {check.target !== null && <span>▼ target {plainNumber(check.target)}</span>}
        {check.ratio !== null && <span>ratio {plainNumber(check.ratio)}</span>}
      </p>
      <p className="text-xs">{check.sentence}</p>
    </figure>
  );
}

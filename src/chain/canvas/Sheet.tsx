import { ViewportPortal } from 'reactflow';
import { scales } from '../../../shared/engine/model/study-model.ts';
import { useChain } from '../chain-context.ts';
import { lanes } from '../lanes.ts';
import { originLines } from '../origin.ts';

const laneNames = { bench: 'Bench', pilot: 'Pilot', plant: 'Plant' } as const;

/** The lanes of the sheet, in the coordinates of the chain: what crosses a line is a scale-up step. */
export function Lanes({ height }: { readonly height: number }) {
  const { state } = useChain();
  return (
    <ViewportPortal>
      <div
        className="pointer-events-none absolute -z-10"
        style={{ left: 0, top: 0, width: 1760, height }}
        aria-hidden="true"
      >
        {scales.map((scale) => {
          const lane = lanes[scale];
          const points = state.model.operatingPoints.filter((point) => point.scale === scale);
          return (
            <div
              key={scale}
              className="absolute inset-y-0 border-r border-line first:border-l"
              style={{ left: lane.from, width: lane.to - lane.from }}
            >
              <p className="flex items-baseline gap-3 border-b border-line px-3 py-1.5">
                <span className="text-lg font-bold tracking-wide uppercase [font-stretch:115%]">
                  {laneNames[scale]}
                </span>
                <span className="min-w-0 truncate text-lg text-ink-2">
                  {points.map((point) => point.name).join(' · ')}
                </span>
              </p>
            </div>
          );
        })}
      </div>
    </ViewportPortal>
  );
}

/** Frame of the drawing with its zone letters, fixed to the window like the border of a map. */
export function Frame() {
  const columns = ['1', '2', '3', '4', '5', '6'];
  const rows = ['A', 'B', 'C', 'D'];
  return (
    <div className="pointer-events-none absolute inset-0 z-[4] border-[16px] border-paper" aria-hidden="true">
      <div className="absolute -inset-[13px] border border-line" />
      <div className="absolute inset-0 border-2 border-rule" />
      <div className="absolute inset-x-0 -top-[16px] grid grid-cols-6 text-center text-[10px] leading-[16px] text-ink-2">
        {columns.map((column) => (
          <span key={column}>{column}</span>
        ))}
      </div>
      <div className="absolute inset-y-0 -left-[16px] grid w-[16px] grid-rows-4 items-center text-center text-[10px] text-ink-2">
        {rows.map((row) => (
          <span key={row}>{row}</span>
        ))}
      </div>
    </div>
  );
}

/** Title block: what this sheet is, its revision, and how its uncertainties are stated. */
export function TitleBlock() {
  const { title, state, evaluation } = useChain();
  const approved = Object.values(state.routeStates).filter((route) => route.status === 'approved').length;
  const cells = [
    { term: 'Study', text: title },
    { term: 'Revision', text: String(state.revision) },
    { term: 'Approved', text: `${approved} of ${state.model.routes.length} routes` },
    { term: 'Uncertainty stated as', text: '± U, k = 2' },
    { term: 'Engine', text: evaluation.engineVersion },
  ];
  return (
    <dl className="flex max-w-full flex-wrap border-2 border-rule bg-surface text-xs">
      {cells.map((cell) => (
        <div key={cell.term} className="max-w-64 min-w-0 border-l border-rule px-2 py-1 first:border-l-0">
          <dt className="text-2xs text-ink-2">{cell.term}</dt>
          <dd className="truncate font-semibold">{cell.text}</dd>
        </div>
      ))}
    </dl>
  );
}

/** What the types of line mean. */
export function LineLegend() {
  return (
    <details className="border border-rule bg-surface px-2 text-xs" open>
      <summary className="min-h-7 cursor-pointer py-1 font-semibold">Line shows where the number comes from</summary>
      <ul className="grid gap-1 pb-2">
        {(['measured', 'correlation', 'given', 'computed'] as const).map((origin) => (
          <li key={origin} className="flex items-center gap-2">
            <Sample dash={originLines[origin].dash} width={originLines[origin].width} />
            {originLines[origin].words}
          </li>
        ))}
        <li className="flex items-center gap-2">
          <Sample dash={undefined} width={4} />
          Heavy: the route in force
        </li>
        <li className="flex items-center gap-2">
          <svg viewBox="0 0 44 14" className="h-3.5 w-11 shrink-0" aria-hidden="true">
            <path d="M1 7 H14 L18 1 L26 13 L30 7 H43" fill="none" stroke="var(--bad)" strokeWidth="1.8" />
          </svg>
          Broken: a match check is outside
        </li>
      </ul>
    </details>
  );
}

function Sample({ dash, width }: { readonly dash: string | undefined; readonly width: number }) {
  return (
    <svg viewBox="0 0 44 8" className="h-2 w-11 shrink-0" aria-hidden="true">
      <line x1="1" x2="43" y1="4" y2="4" stroke="var(--ink)" strokeWidth={width} strokeDasharray={dash} />
    </svg>
  );
}

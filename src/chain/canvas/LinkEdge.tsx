import { BaseEdge, type Edge, EdgeLabelRenderer, type EdgeProps, useStore } from 'reactflow';
import { VerdictMark } from '../../charts/LogWindow.tsx';
import { originLines } from '../origin.ts';
import type { LinkDrawing } from './chain-graph.ts';
import { chamferedPath, pointAlong } from './link-path.ts';

export type LinkFlowEdge = Edge<{ readonly drawing: LinkDrawing; readonly isSelected: boolean }, 'link'>;

/** The break of a drawing line: where a match check fails the link does not go through. */
function Break({ x, y, upright }: { readonly x: number; readonly y: number; readonly upright: boolean }) {
  return (
    <g transform={`translate(${x} ${y}) rotate(${upright ? 90 : 0})`}>
      <rect x="-15" y="-9" width="30" height="18" fill="var(--paper)" />
      <path d="M-16 0 L-8 0 L-4 -11 L4 11 L8 0 L16 0" fill="none" stroke="var(--bad)" strokeWidth="2.2" />
    </g>
  );
}

/** A link with cut corners. Its line type tells the origin of what it carries; heavy where its route is in force. */
export function LinkEdge({ id, data }: EdgeProps<LinkFlowEdge>) {
  const readable = useStore((store) => store.transform[2] >= 0.4);
  const legible = useStore((store) => store.transform[2] >= 0.7);
  if (!data) return null;
  const { drawing, isSelected } = data;
  const line = originLines[drawing.origin];
  const middle = pointAlong(drawing.points, drawing.tagAt);
  const broken = drawing.tag?.verdict === 'outside';
  const width = drawing.adopted ? Math.max(3.2, line.width * 1.6) : line.width;
  const end = drawing.points.at(-1) ?? { x: 0, y: 0 };
  const colour = isSelected ? 'var(--primary)' : drawing.adopted ? 'var(--ink)' : 'var(--line)';
  return (
    <>
      <BaseEdge
        id={id}
        path={chamferedPath(drawing.points)}
        interactionWidth={28}
        style={{ stroke: colour, strokeWidth: width, ...(line.dash ? { strokeDasharray: line.dash } : {}) }}
      />
      <path d={`M${end.x - 14} ${end.y - 5} L${end.x - 4} ${end.y} L${end.x - 14} ${end.y + 5} Z`} fill={colour} />
      {broken && <Break x={middle.x} y={middle.y} upright={middle.upright} />}
      {drawing.tag && readable && (
        <EdgeLabelRenderer>
          <span
            className={`pointer-events-none absolute border bg-paper px-1.5 py-0.5 ${legible ? 'text-xs' : 'text-xl'} ${broken ? 'border-bad' : 'border-transparent'}`}
            style={{
              transform: middle.upright
                ? `translate(12px, -50%) translate(${middle.x}px, ${middle.y}px)`
                : broken
                  ? `translate(-50%, 14px) translate(${middle.x}px, ${middle.y}px)`
                  : `translate(-50%, calc(-100% - 5px)) translate(${middle.x}px, ${middle.y}px)`,
            }}
            aria-hidden="true"
          >
            <VerdictMark verdict={drawing.tag.verdict} words={drawing.tag.words} />
          </span>
        </EdgeLabelRenderer>
      )}
    </>
  );
}

import 'reactflow/dist/style.css';
import './chain.css';
import { type KeyboardEvent, useCallback, useEffect, useMemo, useRef, useState } from 'react';
import {
  type Connection,
  ConnectionMode,
  type NodeChange,
  Panel,
  ReactFlow,
  ReactFlowProvider,
  useReactFlow,
  useStore,
} from 'reactflow';
import { chainLinks } from '../../../shared/engine/evaluate/chain-links.ts';
import { useChain } from '../chain-context.ts';
import { loopOf } from '../editing/connect-choices.ts';
import { type Layout, lanes, nodeHeight, nodeWidth, type Place, placeQuantities, sheetHeight } from '../lanes.ts';
import { topologicalOrder } from '../topological-order.ts';
import { drawLinks, outletY, portY } from './chain-graph.ts';
import { LinkEdge, type LinkFlowEdge } from './LinkEdge.tsx';
import { type QuantityFlowNode, QuantityNode } from './QuantityNode.tsx';
import { Frame, Lanes, LineLegend, TitleBlock } from './Sheet.tsx';
import { handleCanvasKey } from './use-canvas-keys.ts';

const nodeTypes = { quantity: QuantityNode };
const edgeTypes = { link: LinkEdge };
const fitting = { padding: 0.15, maxZoom: 1 };
/** Room that the frame of the sheet takes on each side, px. */
const margin = 24;
/** Below this a value cannot be read; a wider sheet is scrolled instead. */
const smallestFit = 0.42;

export type ChainCanvasProps = {
  /** Both ends drawn, or only the source: then the person chooses the target. `routeId`: dropped on that port. */
  readonly onConnect: (sourceId: string, targetId: string | null, routeId: string | null) => void;
  readonly onRemove: (quantityId: string) => void;
  readonly onListLinks: (quantityId: string) => void;
  /** Asks the inspector to take the focus. */
  readonly onOpen: (id: string) => void;
};

/** The chain as a drafting sheet. It owns pixels; every change of the chain is an edit of the document. */
export function ChainCanvas(props: ChainCanvasProps) {
  return (
    <ReactFlowProvider>
      <Sheet {...props} />
    </ReactFlowProvider>
  );
}

function handlesOf(routeIds: readonly string[]) {
  const size = { width: 28, height: 28 };
  return [
    { id: 'out', type: 'source' as const, position: 'right' as never, x: nodeWidth - 14, y: outletY - 14, ...size },
    { id: 'new', type: 'target' as const, position: 'left' as never, x: -14, y: outletY - 14, ...size },
    ...routeIds.map((id, index) => ({
      id,
      type: 'target' as const,
      position: 'left' as never,
      x: -14,
      y: portY(index) - 14,
      ...size,
    })),
  ];
}

function Sheet({ onConnect, onRemove, onListLinks, onOpen }: ChainCanvasProps) {
  const { document: chain, state, evaluation, selectedId, select, announce, mayEdit, title } = useChain();
  const { model } = state;
  const flow = useReactFlow();
  const wrapper = useRef<HTMLElement>(null);
  const [dragged, setDragged] = useState<Layout>({});
  const [activeId, setActiveId] = useState<string | null>(null);

  const settled = useMemo(() => placeQuantities(model, state.layout), [model, state.layout]);
  const layout = useMemo(() => ({ ...settled, ...dragged }), [settled, dragged]);
  const order = useMemo(() => topologicalOrder(model), [model]);
  const links = useMemo(() => chainLinks(model), [model]);
  const drawings = useMemo(() => drawLinks(model, layout, evaluation, links), [model, layout, evaluation, links]);
  const selectedRoute = model.routes.find((route) => route.id === selectedId);
  const selectedQuantityId = selectedRoute?.quantityId ?? selectedId;
  const tabStop = activeId !== null && order.includes(activeId) ? activeId : (order[0] ?? null);

  const nodes = useMemo(
    () =>
      order.flatMap((id, index): QuantityFlowNode[] => {
        const quantity = model.quantities.find((one) => one.id === id);
        if (!quantity) return [];
        const routeIds = model.routes.filter((route) => route.quantityId === id).map((route) => route.id);
        const size = { width: nodeWidth, height: nodeHeight(routeIds.length) };
        return [
          {
            id,
            type: 'quantity',
            position: layout[id] ?? { x: 0, y: 0 },
            ...size,
            measured: size,
            handles: handlesOf(routeIds),
            draggable: mayEdit.allowed,
            data: {
              quantity,
              position: `${index + 1} of ${order.length}.`,
              isTabStop: id === tabStop,
              isSelected: id === selectedQuantityId,
              onFocus: setActiveId,
            },
          },
        ];
      }),
    [order, model, layout, mayEdit.allowed, tabStop, selectedQuantityId],
  );

  const edges = useMemo(
    () =>
      drawings.map(
        (drawing): LinkFlowEdge => ({
          id: drawing.id,
          type: 'link',
          source: drawing.link.sourceQuantityId,
          sourceHandle: 'out',
          target: drawing.link.targetQuantityId,
          targetHandle: drawing.link.routeId,
          ariaLabel: drawing.words,
          data: { drawing, isSelected: drawing.link.routeId === selectedId },
          zIndex: drawing.adopted ? 1 : 0,
        }),
      ),
    [drawings, selectedId],
  );

  const show = useCallback(
    (id: string) => {
      const place = layout[id];
      const box = wrapper.current?.getBoundingClientRect();
      if (!place || !box) return;
      const { x, y, zoom } = flow.getViewport();
      const [left, top] = [place.x * zoom + x, place.y * zoom + y];
      const inside =
        left > 20 && top > 20 && left + nodeWidth * zoom < box.width - 20 && top + 190 * zoom < box.height - 20;
      if (!inside) void flow.setCenter(place.x + nodeWidth / 2, place.y + 90, { zoom });
    },
    [flow, layout],
  );

  function focusNode(id: string): void {
    setActiveId(id);
    show(id);
    wrapper.current?.querySelector<HTMLElement>(`[data-quantity="${id}"]`)?.focus({ preventScroll: true });
  }

  // All lanes across, the sheet's head at the top: an empty pilot lane is as telling as a full one.
  const bottom = Math.max(...nodes.map((node) => node.position.y + (node.height ?? 0)), 0) + 40;
  const fitAll = useCallback(() => {
    const box = wrapper.current?.getBoundingClientRect();
    if (!box) return;
    const width = lanes.plant.to - lanes.bench.from;
    const zoom = Math.max(
      smallestFit,
      Math.min(1, (box.width - 2 * margin) / width, (box.height - 2 * margin) / bottom),
    );
    const left = Math.max(margin, (box.width - width * zoom) / 2);
    void flow.setViewport({ x: left, y: margin, zoom });
  }, [flow, bottom]);

  // The inspector opens beside the canvas and takes room: what was chosen stays in sight.
  const isNarrow = useStore((store) => store.width);
  // biome-ignore lint/correctness/useExhaustiveDependencies: only when the room or the choice changes, not on each move
  useEffect(() => {
    if (selectedQuantityId) show(selectedQuantityId);
  }, [selectedQuantityId, isNarrow]);

  function handleNodesChange(changes: NodeChange[]): void {
    const moved: Record<string, Place> = {};
    for (const change of changes) {
      if (change.type === 'position' && change.position && change.dragging) moved[change.id] = change.position;
    }
    if (Object.keys(moved).length > 0) setDragged((before) => ({ ...before, ...moved }));
  }

  function move(id: string, place: Place): void {
    const name = model.quantities.find((quantity) => quantity.id === id)?.name ?? 'a quantity';
    chain.move({ ...settled, [id]: { x: Math.round(place.x), y: Math.round(place.y) } }, `Moved ${name}`);
    setDragged({});
  }

  function handleConnect(connection: Connection): void {
    if (!mayEdit.allowed) {
      announce(mayEdit.reason);
      return;
    }
    const loop = loopOf(model, connection.source, connection.target);
    if (loop) announce(loop);
    else
      onConnect(
        connection.source,
        connection.target,
        connection.targetHandle === 'new' ? null : connection.targetHandle,
      );
  }

  function handleKeyDown(event: KeyboardEvent): void {
    const id = event.target instanceof HTMLElement ? event.target.dataset.quantity : undefined;
    if (!id) return;
    const meant = handleCanvasKey(event, id, {
      layout,
      links,
      goTo: focusNode,
      announce,
      open: (quantityId) => {
        select(quantityId);
        onOpen(quantityId);
      },
      close: () => select(null),
      listLinks: onListLinks,
      connect: (quantityId) => (mayEdit.allowed ? onConnect(quantityId, null, null) : announce(mayEdit.reason)),
      remove: onRemove,
      nudge: (quantityId, by) => {
        const place = layout[quantityId];
        if (place && mayEdit.allowed) move(quantityId, { x: place.x + by.x, y: place.y + by.y });
      },
      fit: (what) => (what === 'all' ? fitAll() : void flow.fitView({ ...fitting, nodes: [{ id }] })),
    });
    if (meant) {
      event.preventDefault();
      event.stopPropagation();
    }
  }

  return (
    <section
      ref={wrapper}
      className="chain-canvas @container relative h-full min-h-0 bg-paper"
      aria-label={`Chain of ${title}`}
      onKeyDown={handleKeyDown}
    >
      <p className="sr-only" id="canvas-keys">
        Arrow keys go to the nearest quantity, Alt with left or right follows inputs and outputs, Shift with an arrow
        moves the quantity, Enter opens it, L lists its links, C connects it, Delete removes it, Escape closes the
        inspector.
      </p>
      <ReactFlow<QuantityFlowNode, LinkFlowEdge>
        nodes={nodes}
        edges={edges}
        nodeTypes={nodeTypes}
        edgeTypes={edgeTypes}
        onNodesChange={handleNodesChange}
        onNodeDragStop={(_, node) => {
          const before = settled[node.id];
          if (before && (before.x !== node.position.x || before.y !== node.position.y)) move(node.id, node.position);
        }}
        onNodeClick={(event, node) => {
          // A port is for linking; opening the inspector would move the sheet between its two clicks.
          if (event.target instanceof Element && event.target.closest('.react-flow__handle')) return;
          setActiveId(node.id);
          select(node.id);
        }}
        onEdgeClick={(_, edge) => select(edge.data?.drawing.link.routeId ?? null)}
        onPaneClick={() => select(null)}
        onConnect={handleConnect}
        isValidConnection={(connection) => connection.source !== connection.target}
        connectionMode={ConnectionMode.Strict}
        connectionRadius={28}
        nodesFocusable={false}
        edgesFocusable={false}
        elementsSelectable={false}
        disableKeyboardA11y
        nodesConnectable={mayEdit.allowed}
        deleteKeyCode={null}
        selectionKeyCode={null}
        multiSelectionKeyCode={null}
        panOnScroll
        zoomOnDoubleClick={false}
        minZoom={0.2}
        maxZoom={2}
        onInit={() => {
          fitAll();
          if (selectedQuantityId) show(selectedQuantityId);
        }}
        ariaLabelConfig={{
          'node.a11yDescription.default': '',
          'node.a11yDescription.keyboardDisabled': '',
          'edge.a11yDescription.default': '',
        }}
      >
        <Lanes height={sheetHeight(model, layout) + 2000} />
        <Panel position="bottom-left" className="m-6! hidden @3xl:block">
          <LineLegend />
        </Panel>
        <Panel position="bottom-right" className="m-6! hidden max-w-[60%] @5xl:block">
          <TitleBlock />
        </Panel>
        <Panel position="top-right" className="m-5!">
          <ZoomButtons onFit={fitAll} />
        </Panel>
      </ReactFlow>
      <Frame />
    </section>
  );
}

function ZoomButtons({ onFit }: { readonly onFit: () => void }) {
  const flow = useReactFlow();
  const percent = useStore((store) => Math.round(store.transform[2] * 100));
  const button = 'min-h-8 min-w-8 px-2 hover:bg-sunk border-l border-rule first:border-l-0';
  return (
    <fieldset className="flex border border-rule bg-surface text-sm">
      <legend className="sr-only">Zoom</legend>
      <button type="button" className={button} aria-label="Zoom out" onClick={() => void flow.zoomOut()}>
        −
      </button>
      <output className="num min-w-14 border-l border-rule px-2 py-1.5 text-center text-xs" aria-label="Zoom level">
        {percent} %
      </output>
      <button type="button" className={button} aria-label="Zoom in" onClick={() => void flow.zoomIn()}>
        +
      </button>
      <button type="button" className={button} onClick={onFit}>
        Fit
      </button>
    </fieldset>
  );
}

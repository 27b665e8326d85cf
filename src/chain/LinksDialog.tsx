import { chainLinks } from '../../shared/engine/evaluate/chain-links.ts';
import { Dialog } from '../ui/Dialog.tsx';
import { drawLinks } from './canvas/chain-graph.ts';
import { useChain } from './chain-context.ts';
import { smallButton } from './inspector/fields.tsx';

/** The links of one quantity in words, each with a way to its route. */
export function LinksDialog({ quantityId, onClose }: { readonly quantityId: string; readonly onClose: () => void }) {
  const { state, evaluation, select } = useChain();
  const quantity = state.model.quantities.find((one) => one.id === quantityId);
  const drawings = drawLinks(state.model, state.layout, evaluation, chainLinks(state.model));
  const inputs = drawings.filter((drawing) => drawing.link.targetQuantityId === quantityId);
  const outputs = drawings.filter((drawing) => drawing.link.sourceQuantityId === quantityId);
  return (
    <Dialog open title={`Links of ${quantity?.name ?? 'the quantity'}`} onClose={onClose}>
      {[
        { heading: 'Comes from', links: inputs, none: 'No links lead here.' },
        { heading: 'Feeds', links: outputs, none: 'It feeds nothing.' },
      ].map(({ heading, links, none }) => (
        <section key={heading} className="grid gap-1 pb-3">
          <h3 className="text-sm font-semibold">{heading}</h3>
          {links.length === 0 && <p className="text-sm text-ink-2">{none}</p>}
          <ul className="grid gap-1">
            {links.map((drawing) => (
              <li key={drawing.id} className="flex items-center justify-between gap-3 text-sm">
                <span>{drawing.words}.</span>
                <button
                  type="button"
                  className={smallButton}
                  onClick={() => {
                    select(drawing.link.routeId);
                    onClose();
                  }}
                >
                  Open route
                </button>
              </li>
            ))}
          </ul>
        </section>
      ))}
    </Dialog>
  );
}

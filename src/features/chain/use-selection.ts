import { useCallback, useSyncExternalStore } from 'react';
import { useSearchParams } from 'react-router-dom';

export type View = 'canvas' | 'outline';

const narrow = '(max-width: 767px)';

function watchWidth(onChange: () => void): () => void {
  const query = window.matchMedia(narrow);
  query.addEventListener('change', onChange);
  return () => query.removeEventListener('change', onChange);
}

/** What is selected and how the chain is shown, in the address: a link shows another person the same. */
export function useSelection() {
  const [search, setSearch] = useSearchParams();
  const isNarrow = useSyncExternalStore(watchWidth, () => window.matchMedia(narrow).matches);
  const asked = search.get('view');
  const view: View = asked === 'outline' || asked === 'canvas' ? asked : isNarrow ? 'outline' : 'canvas';

  const select = useCallback(
    (id: string | null) =>
      setSearch(
        (before) => {
          const next = new URLSearchParams(before);
          if (id === null) next.delete('selected');
          else next.set('selected', id);
          return next;
        },
        { replace: true },
      ),
    [setSearch],
  );
  const show = useCallback(
    (next: View) =>
      setSearch((before) => {
        const params = new URLSearchParams(before);
        params.set('view', next);
        return params;
      }),
    [setSearch],
  );
  return { selectedId: search.get('selected'), select, view, show };
}

import { useEffect } from 'react';

/** The title of the tab; a form with a problem says so first, as screen readers read it first. */
export function usePageTitle(title: string, problem = false): void {
  useEffect(() => {
    document.title = `${problem ? 'Error: ' : ''}${title} · Stemma`;
  }, [title, problem]);
}

import { useEffect, useState } from 'react';

/** Says what is awaited, but only after a moment: a flash of text is worse than none. */
export function Loading({ what }: { readonly what: string }) {
  const [isShown, setShown] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setShown(true), 250);
    return () => clearTimeout(timer);
  }, []);
  return (
    <p role="status" className="min-h-24 p-6 text-ink-2">
      {isShown ? `Loading ${what} …` : ''}
    </p>
  );
}

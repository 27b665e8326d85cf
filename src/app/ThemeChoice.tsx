import { useState } from 'react';

/** Light or dark; the first choice is the system's (`public/theme.js`), this one is kept. */
export function ThemeChoice() {
  const [theme, setTheme] = useState(document.documentElement.dataset.theme === 'dark' ? 'dark' : 'light');
  const other = theme === 'dark' ? 'light' : 'dark';
  function handleClick() {
    document.documentElement.dataset.theme = other;
    try {
      localStorage.setItem('stemma-theme', other);
    } catch {
      // Without storage the choice lasts as long as the page.
    }
    setTheme(other);
  }
  return (
    <button
      type="button"
      onClick={handleClick}
      className="grid size-8 place-items-center"
      aria-label={`Change to ${other} colours`}
    >
      <svg
        viewBox="0 0 16 16"
        className="size-4"
        stroke="currentColor"
        strokeWidth="1.5"
        fill="none"
        aria-hidden="true"
      >
        <circle cx="8" cy="8" r="6" />
        <path d="M8 2 a6 6 0 0 1 0 12 z" fill="currentColor" />
      </svg>
    </button>
  );
}

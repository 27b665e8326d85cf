/** Two facts on which one number rests. */
export function Mark() {
  return (
    <svg viewBox="0 0 32 32" className="size-8 text-primary" fill="none" aria-hidden="true">
      <path d="M7 6v6l9 6v8M25 6v6l-9 6" stroke="currentColor" strokeWidth="2.6" />
      <path d="M4.5 3.5h5v5h-5zM22.5 3.5h5v5h-5zM13.5 24h5v5h-5z" fill="currentColor" />
    </svg>
  );
}

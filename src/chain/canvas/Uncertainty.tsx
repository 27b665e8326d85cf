/** A short rule of ± 30 % with the standard uncertainty of a result on it; beyond that the bar runs to the ends. */
export function UncertaintyRule({ value, u }: { readonly value: number; readonly u: number }) {
  if (value === 0) return null;
  const relative = Math.abs(u / value);
  const half = Math.min(1, relative / 0.3) * 44;
  const percent = relative * 200;
  const words = `${percent < 10 ? percent.toFixed(1) : Math.round(percent)} %`;
  return (
    <span className="inline-flex items-center gap-1.5 whitespace-nowrap">
      <svg viewBox="0 0 92 14" className="h-3.5 w-[92px]" aria-hidden="true">
        <line x1="2" x2="90" y1="11" y2="11" stroke="var(--line)" />
        {[2, 16.7, 31.3, 46, 60.7, 75.3, 90].map((x) => (
          <line key={x} x1={x} x2={x} y1="8" y2="11" stroke="var(--line)" />
        ))}
        <rect x={46 - half} y="4" width={Math.max(1.5, half * 2)} height="5" fill="var(--ink)" />
        <rect x="45.2" y="2" width="1.6" height="9" fill="var(--surface)" />
      </svg>
      <span className="num text-2xs text-ink-2">±{words}</span>
    </span>
  );
}

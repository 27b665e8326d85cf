const greek: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  delta: 'δ',
  epsilon: 'ε',
  eta: 'η',
  theta: 'θ',
  lambda: 'λ',
  mu: 'μ',
  nu: 'ν',
  pi: 'π',
  rho: 'ρ',
  sigma: 'σ',
  tau: 'τ',
  phi: 'φ',
  omega: 'ω',
  Delta: 'Δ',
  Phi: 'Φ',
};

/** A quantity's symbol: italic, with what follows an underscore as an upright subscript. */
export function Symbol_({ symbol }: { readonly symbol: string }) {
  const [head = '', ...tail] = symbol.split('_');
  return (
    <span className="whitespace-nowrap">
      <i className="sym">{greek[head] ?? head}</i>
      {tail.length > 0 && <sub className="text-[0.7em]">{tail.join(' ')}</sub>}
    </span>
  );
}

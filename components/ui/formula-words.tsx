import { ProportionalTo } from './notation';

/** A sentence that holds a law as text, "dN/dM ∝ M^−1.3": the sign is drawn, the index raised. */
export function FormulaWords({ text }: { text: string }) {
  const parts = text.split(/( ∝ |\^[−-]?[\d.]+)/);
  return parts.map((part, index) => {
    const key = `${index} ${part}`;
    if (part === ' ∝ ') return <ProportionalTo key={key} />;
    if (part.startsWith('^')) return <sup key={key}>{part.slice(1)}</sup>;
    return part;
  });
}

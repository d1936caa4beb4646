import { FormulaWords } from '@/components/ui/formula-words';
import type { StatedLimit as Stated } from '@/lib/schemas/exercises';

/** A limit as its sentence, its conditions one press away. */
export function StatedLimit({ stated }: { stated: Stated }) {
  return (
    <div className="min-w-0">
      <p className="max-w-[72ch] text-pretty">{stated.sentence}</p>
      <details className="text-chart text-ink3">
        <summary className="w-max py-1 text-act max-md:py-3">conditions</summary>
        <ul className="max-w-[60ch]">
          {stated.conditions.map((condition) => (
            <li key={condition}>
              <FormulaWords text={condition} />
            </li>
          ))}
        </ul>
      </details>
    </div>
  );
}

import type { FileKind } from './file-kinds';

function Columns({ names, isNeeded }: { names: string[]; isNeeded: boolean }) {
  return (
    <ul className="mt-1 mb-3 flex flex-wrap gap-1.5">
      {names.map((name) => (
        <li
          key={name}
          className={`rounded border px-2 py-0.5 text-note ${isNeeded ? 'border-transparent bg-well text-ink' : 'border-rule text-ink2'}`}
        >
          {name}
        </li>
      ))}
    </ul>
  );
}

/** Columns of a kind of file, and a sample that holds them. */
export function FileNeeds({ kind }: { kind: FileKind }) {
  return (
    <div className="text-note">
      <p className="text-ink3">Columns that it needs</p>
      <Columns names={kind.needs} isNeeded />
      {kind.takes.length > 0 && (
        <>
          <p className="text-ink3">Read too, if they are there</p>
          <Columns names={kind.takes} isNeeded={false} />
        </>
      )}
      <p className="max-w-[72ch] text-ink2">{kind.note}</p>
      {kind.sample !== undefined && (
        <p className="mt-2">
          <a href={`/samples/${kind.sample}`} download>
            A sample, {kind.sample}
          </a>
        </p>
      )}
    </div>
  );
}

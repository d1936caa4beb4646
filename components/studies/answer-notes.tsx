/** What the computation wants to be known beside its numbers. */
export function AnswerNotes({ notes }: { notes: string[] }) {
  if (notes.length === 0) return null;
  return (
    <ul className="mt-3 grid max-w-[72ch] gap-1 text-ink2 text-note">
      {notes.map((note) => (
        <li key={note}>{note}</li>
      ))}
    </ul>
  );
}

import { type Nameable, splitMentions } from './mentions';

/** Words of a note as text and nothing else, whatever they hold; names of people stand out. */
export function NoteText({ body, mentions }: { body: string; mentions: readonly Nameable[] }) {
  return (
    <p
      dir="auto"
      className="w-fit max-w-[min(72ch,100%)] whitespace-pre-wrap [overflow-wrap:anywhere]"
    >
      {splitMentions(body, mentions).map(({ text, person }, index) =>
        person ? (
          // biome-ignore lint/suspicious/noArrayIndexKey: the pieces of a text have no other name
          <b key={index} className="font-semibold text-act">
            <bdi>{text}</bdi>
          </b>
        ) : (
          text
        ),
      )}
    </p>
  );
}

'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { revokeGuestLink, useGuestLinks } from '@/components/hooks/use-releases';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';
import { useDay } from '@/components/ui/time-zone';
import type { GuestLinkView } from '@/lib/schemas/releases';

const standing = (link: GuestLinkView, day: (moment: string) => string) =>
  link.revokedAt !== null
    ? 'ended by hand'
    : link.isOpen
      ? `open until ${day(link.expiresAt)}`
      : `ended on ${day(link.expiresAt)}`;

/** Private links, when each was last used, and what its holder wrote. */
export function GuestLinks({
  collaboration,
  initial,
  canEnd,
  opens,
}: {
  collaboration: string;
  initial: GuestLinkView[];
  canEnd: boolean;
  /** Only those that open this: "R-4". */
  opens?: string;
}) {
  const day = useDay();
  const { data = initial, mutate } = useGuestLinks(collaboration, initial);
  const [problem, setProblem] = useState<string>();
  const links = opens === undefined ? data : data.filter((link) => link.opens === opens);
  const end = async (id: string) => {
    setProblem(undefined);
    try {
      await revokeGuestLink(collaboration, id);
      await mutate();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    }
  };
  return (
    <section className="min-w-0">
      <SectionOpener
        title="Links for guests"
        context="without an account, for a referee; each opens one draft or frozen run"
      />
      {problem !== undefined && (
        <Notice tone="bad" title="The link was not ended." isAnnounced>
          {problem}
        </Notice>
      )}
      {links.length === 0 ? (
        <p className="text-ink3 text-note">
          None. Give one on the page of a draft, or where a run is frozen.
        </p>
      ) : (
        <ul className="text-note">
          {links.map((link) => (
            <li key={link.id} className="border-rule border-b py-2.5">
              <div className="flex flex-wrap items-baseline justify-between gap-x-4">
                <p>
                  <b>{link.label}</b> reads {link.opens}
                </p>
                {canEnd && link.isOpen && (
                  <TextAction onClick={() => void end(link.id)}>
                    End it<span className="sr-only">: {link.label}</span>
                  </TextAction>
                )}
              </div>
              <p className="text-ink3">
                …{link.ending}, {standing(link, day)};{' '}
                {link.lastUsedAt === null ? 'not used yet' : `last used ${day(link.lastUsedAt)}`}
                {link.createdBy !== null && `; given by ${link.createdBy}`}
              </p>
              {link.notes.map((note) => (
                <blockquote key={note.id} className="mt-2 border-rule2 border-l-2 pl-3">
                  <p className="text-ink3">
                    {note.name} (guest), {day(note.createdAt)}
                  </p>
                  <p className="whitespace-pre-wrap">{note.body}</p>
                </blockquote>
              ))}
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

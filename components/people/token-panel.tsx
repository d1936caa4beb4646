'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { revokeToken, useTokens } from '@/components/hooks/use-people';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import { announce } from '@/components/ui/toast-store';
import type { TokenView } from '@/lib/schemas/people';
import { TokenForm } from './token-form';

/** Tokens of this person for scripts; a new one is shown once. */
export function TokenPanel({
  collaboration,
  address,
  initial,
}: {
  collaboration: string;
  /** Of this laboratory, as scripts reach it. */
  address: string;
  initial: TokenView[];
}) {
  const { data: tokens = initial, mutate } = useTokens(collaboration, initial);
  const moment = useMoment();
  const dayOf = (at: string | null) => (at === null ? 'never' : moment(at, 'day'));
  const [made, setMade] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const attempt = async (work: () => Promise<void>) => {
    setRefusal(null);
    try {
      await work();
      await mutate();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  return (
    <div className="grid gap-x-14 gap-y-10 lg:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
      <section className="min-w-0">
        <SectionOpener title="Your tokens" context="nobody else sees them" />
        {made !== null && (
          <div className="mb-3">
            <Notice
              tone="ok"
              icon="key"
              title={<code className="break-all">{made}</code>}
              actions={
                <TextAction
                  icon="copy"
                  onClick={() =>
                    void navigator.clipboard
                      .writeText(made)
                      .then(() => announce({ tone: 'ok', title: 'The token is copied.' }))
                  }
                >
                  Copy
                </TextAction>
              }
              isAnnounced
            >
              Shown once: keep it where only you can read it.
            </Notice>
          </div>
        )}
        {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
        {tokens.length === 0 ? (
          <p className="py-2 text-ink3">None yet. A script sends one with each request:</p>
        ) : (
          <Table caption="Your tokens">
            <TableHead>
              <Row>
                <HeadCell>token</HeadCell>
                <HeadCell>may</HeadCell>
                <HeadCell>last used</HeadCell>
                <HeadCell>ends</HeadCell>
                <HeadCell>
                  <span className="sr-only">revoke</span>
                </HeadCell>
              </Row>
            </TableHead>
            <TableBody>
              {tokens.map((token) => (
                <Row key={token.id}>
                  <Cell>
                    <span className="font-semibold">{token.name}</span>{' '}
                    <span className="text-ink3">…{token.ending}</span>
                  </Cell>
                  <Cell>{token.scopes.join(', ')}</Cell>
                  <Cell>{dayOf(token.lastUsedAt)}</Cell>
                  <Cell>{token.revokedAt === null ? dayOf(token.expiresAt) : 'revoked'}</Cell>
                  <Cell>
                    {token.revokedAt === null && (
                      <TextAction
                        onClick={() => void attempt(() => revokeToken(collaboration, token.id))}
                      >
                        Revoke<span className="sr-only"> {token.name}</span>
                      </TextAction>
                    )}
                  </Cell>
                </Row>
              ))}
            </TableBody>
          </Table>
        )}
        <pre className="mt-4 overflow-x-auto rounded-plate bg-well px-4 py-3 text-ink2 text-note">
          {`curl -H "Authorization: Bearer rb_…" \\\n  ${address}/api/v1/collaborations/${collaboration}/analyses`}
        </pre>
        <p className="mt-3 text-ink2 text-note">
          The{' '}
          <Link href="/api-guide" className="underline">
            pages of the API
          </Link>{' '}
          have each address with its scope and an example.
        </p>
      </section>
      <section className="min-w-0">
        <SectionOpener title="New token" />
        <TokenForm
          collaboration={collaboration}
          onMade={(token) => {
            setMade(token);
            setRefusal(null);
            void mutate();
          }}
        />
      </section>
    </div>
  );
}

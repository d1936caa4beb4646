'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { createToken, revokeToken, useTokens } from '@/components/hooks/use-people';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { Notice } from '@/components/ui/notice';
import { NumberField } from '@/components/ui/number-field';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { TextField } from '@/components/ui/text-field';
import type { TokenView } from '@/lib/schemas/people';

const dayOf = (moment: string | null) =>
  moment === null
    ? 'never'
    : new Date(moment).toLocaleDateString('en-GB', {
        day: 'numeric',
        month: 'short',
        year: 'numeric',
        timeZone: 'UTC',
      });

const scopes = [
  { value: 'read', label: 'read', hint: 'surveys, maps, populations, analyses, results' },
  { value: 'write', label: 'write', hint: 'surveys, files, populations, analyses' },
  { value: 'run', label: 'run', hint: 'start maps and runs' },
];

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
  const [chosen, setChosen] = useState(['read']);
  const [isCopied, setCopied] = useState(false);
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
                    void navigator.clipboard.writeText(made).then(() => setCopied(true))
                  }
                >
                  <span aria-live="polite">{isCopied ? 'Copied' : 'Copy'}</span>
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
      </section>
      <section className="min-w-0">
        <SectionOpener title="New token" />
        <form
          className="flex max-w-[440px] flex-col gap-4"
          onSubmit={(event) => {
            event.preventDefault();
            const form = new FormData(event.currentTarget);
            void attempt(async () => {
              const token = await createToken(collaboration, {
                name: String(form.get('name')),
                days: Number(form.get('days')),
                scopes: chosen,
              });
              setMade(token.token);
              setCopied(false);
            });
          }}
        >
          <TextField label="What it is for" name="name" required maxLength={100} />
          <fieldset className="flex flex-col gap-2">
            <legend className="mb-1 text-[14px] text-ink3">It may</legend>
            {scopes.map((scope) => (
              <CheckboxField
                key={scope.value}
                label={scope.label}
                hint={scope.hint}
                checked={chosen.includes(scope.value)}
                onChange={(event) =>
                  setChosen(
                    event.target.checked
                      ? [...chosen, scope.value]
                      : chosen.filter((held) => held !== scope.value),
                  )
                }
              />
            ))}
          </fieldset>
          <NumberField
            label="It ends after"
            name="days"
            unit="days"
            defaultValue={90}
            min={1}
            max={365}
            required
          />
          <div>
            <Button
              type="submit"
              variant="primary"
              icon="key"
              disabledReason={chosen.length === 0 ? 'Choose what it may do' : undefined}
            >
              Make a token
            </Button>
          </div>
        </form>
      </section>
    </div>
  );
}

'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { retryMessage, useFailedMessages } from '@/components/hooks/use-settings';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { FailedMessage } from '@/lib/schemas/mail';

const kindWords: Record<string, string> = {
  invitation: 'invitation',
  mention: 'mention in a note',
  notes: 'notes, gathered',
  run: 'end of a run',
};

/** Messages that were given up, why, and another try. */
export function FailedMail({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: FailedMessage[];
}) {
  const { data: messages = initial, mutate } = useFailedMessages(collaboration, initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const moment = useMoment();
  const again = async (id: string) => {
    setRefusal(null);
    try {
      await retryMessage(collaboration, id);
      await mutate();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  return (
    <>
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {messages.length === 0 ? (
        <p className="text-ink3">Every message has gone or is on its way.</p>
      ) : (
        <Table caption="Messages that could not be delivered">
          <TableHead>
            <Row>
              <HeadCell>message</HeadCell>
              <HeadCell>to</HeadCell>
              <HeadCell>given up</HeadCell>
              <HeadCell>
                <span className="sr-only">again</span>
              </HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            {messages.map((message) => (
              <Row key={message.id}>
                <Cell>
                  {kindWords[message.kind] ?? message.kind.replaceAll('-', ' ')}
                  <span className="block text-ink3">{message.fault}</span>
                </Cell>
                <Cell className="[overflow-wrap:anywhere]">
                  <bdi>{message.to}</bdi>
                </Cell>
                <Cell className="whitespace-nowrap">{moment(message.endedAt)}</Cell>
                <Cell>
                  {message.kind !== 'notes' && (
                    <TextAction onClick={() => void again(message.id)}>
                      Try again<span className="sr-only"> to reach {message.to}</span>
                    </TextAction>
                  )}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
    </>
  );
}

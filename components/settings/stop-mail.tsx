'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { stopMail } from '@/components/hooks/use-settings';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';

/** Asks once, so that a program which follows links in mail stops nothing. */
export function StopMail({ token, label }: { token: string; label: string }) {
  const [state, setState] = useState<'asked' | 'busy' | 'stopped'>('asked');
  const [refusal, setRefusal] = useState<string | null>(null);
  const stop = async () => {
    setState('busy');
    setRefusal(null);
    try {
      await stopMail(token);
      setState('stopped');
    } catch (reason) {
      setRefusal(sentenceOf(reason));
      setState('asked');
    }
  };
  if (state === 'stopped') {
    return (
      <Notice tone="ok" title={`No more messages of the kind “${label}”.`} isAnnounced>
        Your own page in the laboratory, under Mail, can bring them back.
      </Notice>
    );
  }
  return (
    <>
      <p className="mb-4">
        You will get no more messages of the kind <b>{label}</b>. Other kinds still come.
      </p>
      {refusal !== null && (
        <div className="mb-4">
          <Notice tone="bad" title={refusal} isAnnounced />
        </div>
      )}
      <Button variant="primary" isBusy={state === 'busy'} onClick={() => void stop()}>
        Stop them
      </Button>
    </>
  );
}

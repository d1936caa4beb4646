'use client';

import { useState } from 'react';
import { apiPath } from '@/components/hooks/api-path';
import { useUploads } from '@/components/hooks/use-uploads';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { UploadView } from '@/lib/schemas/uploads';
import { WithdrawDialog } from './withdraw-dialog';

const kindWords: Record<UploadView['kind'], string> = {
  targets: 'targets',
  'contrast-curves': 'contrast curves',
  'completeness-maps': 'ready maps',
  companions: 'companions',
  'cooling-tables': 'cooling table',
  systems: 'systems',
};

function StateOf({ upload }: { upload: UploadView }) {
  const moment = useMoment();
  if (upload.state === 'stored') return <StateMark kind="ok">stored</StateMark>;
  if (upload.state === 'read') return <StateMark kind="draft">read, not stored</StateMark>;
  const by = upload.withdrawnBy === null ? '' : ` by ${upload.withdrawnBy}`;
  return (
    <StateMark kind="stopped">
      withdrawn{by}
      {upload.withdrawnAt !== null && `, ${moment(upload.withdrawnAt, 'full')}`}
    </StateMark>
  );
}

interface UploadListProps {
  collaboration: string;
  survey: string;
  uploads: UploadView[];
  canWithdraw: boolean;
  /** After a file was withdrawn: targets, curves and maps are others then. */
  onChanged(): void;
}

/** The files that the survey was made from, each with its fingerprint and its original bytes. */
export function UploadList(props: UploadListProps) {
  const moment = useMoment();
  const { collaboration, survey, canWithdraw, onChanged } = props;
  const { data: uploads = props.uploads, mutate } = useUploads(
    collaboration,
    survey,
    props.uploads,
  );
  const [chosen, setChosen] = useState<UploadView | null>(null);
  if (uploads.length === 0) return <p className="py-6 text-ink3">No file has come in yet.</p>;
  return (
    <>
      <WithdrawDialog
        key={chosen?.id}
        collaboration={collaboration}
        upload={chosen}
        onClose={() => setChosen(null)}
        onWithdrawn={() => {
          void mutate();
          onChanged();
        }}
      />
      <Table caption="Files of the survey">
        <TableHead>
          <Row>
            <HeadCell>file</HeadCell>
            <HeadCell>kind, version</HeadCell>
            <HeadCell>what it said</HeadCell>
            <HeadCell>by</HeadCell>
            <HeadCell>when, UTC</HeadCell>
            <HeadCell>state</HeadCell>
            <HeadCell>SHA-256</HeadCell>
            {canWithdraw && (
              <HeadCell>
                <span className="sr-only">take back</span>
              </HeadCell>
            )}
          </Row>
        </TableHead>
        <TableBody>
          {uploads.map((upload) => (
            <Row key={upload.id}>
              <Cell isRowHead>
                <a href={apiPath(collaboration, 'uploads', upload.id, 'file')} download>
                  {upload.fileName}
                </a>
              </Cell>
              <Cell className="whitespace-nowrap">
                {kindWords[upload.kind]}
                {upload.version !== null && `, ${upload.version}`}
              </Cell>
              <Cell>{upload.report.summary}</Cell>
              <Cell className="whitespace-nowrap">{upload.uploadedBy ?? '–'}</Cell>
              <Cell className="whitespace-nowrap">
                {moment(upload.storedAt ?? upload.createdAt, 'full')}
              </Cell>
              <Cell>
                <StateOf upload={upload} />
              </Cell>
              <Cell>
                <code title={upload.sha256}>{upload.sha256.slice(0, 8)}</code>
              </Cell>
              {canWithdraw && (
                <Cell>
                  {upload.state === 'stored' && (
                    <TextAction onClick={() => setChosen(upload)}>
                      Withdraw<span className="sr-only"> {upload.fileName}</span>
                    </TextAction>
                  )}
                </Cell>
              )}
            </Row>
          ))}
        </TableBody>
      </Table>
    </>
  );
}

import { apiPath } from '@/components/hooks/api-path';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { UploadView } from '@/lib/schemas/uploads';

const when = (moment: string) =>
  new Date(moment).toLocaleString('en-GB', {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZone: 'UTC',
  });

/** The files that the survey was made from, each with its fingerprint and its original bytes. */
export function UploadList({
  collaboration,
  uploads,
}: {
  collaboration: string;
  uploads: UploadView[];
}) {
  if (uploads.length === 0) return <p className="py-6 text-ink3">No file has come in yet.</p>;
  return (
    <Table caption="Files of the survey">
      <TableHead>
        <Row>
          <HeadCell>file</HeadCell>
          <HeadCell>what it said</HeadCell>
          <HeadCell>by</HeadCell>
          <HeadCell>when, UTC</HeadCell>
          <HeadCell>state</HeadCell>
          <HeadCell>SHA-256</HeadCell>
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
            <Cell>{upload.report.summary}</Cell>
            <Cell className="whitespace-nowrap">{upload.uploadedBy ?? '–'}</Cell>
            <Cell className="whitespace-nowrap">{when(upload.storedAt ?? upload.createdAt)}</Cell>
            <Cell>
              {upload.state === 'stored' ? (
                <StateMark kind="ok">stored</StateMark>
              ) : (
                <StateMark kind="draft">read, not stored</StateMark>
              )}
            </Cell>
            <Cell>
              <code title={upload.sha256}>{upload.sha256.slice(0, 8)}</code>
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

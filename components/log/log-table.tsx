'use client';

import { Link } from '@/components/ui/link';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { useMoment } from '@/components/ui/time-zone';
import type { AuditEntryView } from '@/lib/schemas/audit';
import { changesOf } from './changes';

function Changes({ entry }: { entry: AuditEntryView }) {
  const changes = changesOf(entry.details);
  if (changes.length === 0) return null;
  return (
    <ul className="mt-1 text-ink2 text-chart">
      {changes.map(({ name, before, after }) => (
        <li key={name} className="[overflow-wrap:anywhere]">
          {name !== '' && <span className="text-ink3">{name}: </span>}
          {before !== null && (
            <>
              <span className="sr-only">before </span>
              <del className="text-ink3 decoration-rule2">{before}</del>{' '}
            </>
          )}
          <span className="sr-only">after </span>
          <ins className="no-underline">{after ?? 'nothing'}</ins>
        </li>
      ))}
    </ul>
  );
}

/** "create-survey" → "create survey". */
const actionWords = ({ action }: AuditEntryView) => action.replaceAll('-', ' ');

const addressWords = (address: string | null) =>
  address === null ? '–' : address === 'direct' ? 'not known' : address;

interface LogTableProps {
  collaboration: string;
  entries: readonly AuditEntryView[];
  /** Address of this page with only this thing's entries. */
  onlyItem(id: string): string;
}

/** Who did what, when, from where, and what it was before and after. */
export function LogTable({ collaboration, entries, onlyItem }: LogTableProps) {
  const moment = useMoment();
  return (
    <Table caption="Entries of the log, newest first">
      <TableHead>
        <Row>
          <HeadCell>when</HeadCell>
          <HeadCell>who, what</HeadCell>
          <HeadCell className="max-md:hidden">thing</HeadCell>
          <HeadCell className="max-md:hidden">action</HeadCell>
          <HeadCell className="max-md:hidden">from</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {entries.map((entry) => (
          <Row key={entry.id} className="align-top">
            <Cell className="whitespace-nowrap align-top text-ink3">
              <time dateTime={entry.at}>{moment(entry.at, 'full')}</time>
            </Cell>
            <Cell className="align-top">
              <b className="font-semibold">
                <bdi>{entry.who}</bdi>
              </b>{' '}
              <span className="[overflow-wrap:anywhere]">{entry.summary}</span>
              {typeof entry.details.via === 'string' && entry.details.via === 'token' && (
                <span className="text-ink3"> by a token</span>
              )}
              <Changes entry={entry} />
              <span className="block text-ink3 md:hidden">
                {actionWords(entry)}
                {entry.address !== null && `, from: ${addressWords(entry.address)}`}
              </span>
            </Cell>
            <Cell className="max-w-[220px] align-top max-md:hidden">
              {entry.item === null ? (
                <span className="text-ink3">{entry.itemKind}</span>
              ) : entry.path === null ? (
                entry.item
              ) : (
                <Link href={`/${collaboration}${entry.path}`} className="[overflow-wrap:anywhere]">
                  <bdi>{entry.item}</bdi>
                </Link>
              )}
              <Link href={onlyItem(entry.itemId)} className="block text-chart">
                only this
                <span className="sr-only">: entries of {entry.item ?? entry.itemKind}</span>
              </Link>
            </Cell>
            <Cell className="whitespace-nowrap align-top text-ink2 max-md:hidden">
              {actionWords(entry)}
            </Cell>
            <Cell className="whitespace-nowrap align-top text-ink3 max-md:hidden">
              {addressWords(entry.address)}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

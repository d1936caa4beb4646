'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { useAction } from '@/components/hooks/use-action';
import { useSurveyMaps } from '@/components/hooks/use-maps';
import { startMaps } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { MapStanding, MapState } from '@/lib/schemas/map-states';
import { standingWords } from './standing-words';

interface SurveyMapsProps {
  collaboration: string;
  slug: string;
  canRefresh: boolean;
  /** Changes when maps arrive, so that the list is asked for again. */
  stamp?: string;
  onStarted?(): void;
}

const order: MapStanding[] = ['stale', 'missing', 'failed', 'current', 'uploaded', 'none'];
const toDo: MapStanding[] = ['stale', 'missing', 'failed'];

/** Which maps of a survey are not what its curves would give now, and why; one press refreshes them. */
export function SurveyMaps(props: SurveyMapsProps) {
  const { collaboration, slug, canRefresh, stamp, onStarted } = props;
  const { data, error, mutate } = useSurveyMaps(collaboration, slug, stamp);
  const { perform, isBusy, problem } = useAction();
  if (error !== undefined) {
    return (
      <Notice tone="bad" title="The maps could not be looked through.">
        {sentenceOf(error)}
      </Notice>
    );
  }
  if (!data) return <p className="py-3 text-ink3">The maps are being looked through.</p>;
  const isOpen = data.job?.status === 'running' || data.job?.status === 'waiting';
  const count = (standing: MapStanding) =>
    data.maps.filter((map) => map.standing === standing).length;
  const open = count('stale') + count('missing');
  const refresh = () =>
    perform(async () => {
      await startMaps(collaboration, slug);
      await mutate();
      onStarted?.();
    });
  return (
    <div>
      <div className="mb-3 flex flex-wrap items-center justify-between gap-3">
        <p className="text-ink2">
          {order
            .filter((standing) => count(standing) > 0)
            .map((standing) => `${count(standing)} ${standingWords[standing]}`)
            .join(', ')}
          .{' '}
          {count('stale') > 0 &&
            'A stale map stays in use until it is refreshed; runs that used it do not change.'}
        </p>
        {canRefresh && open > 0 && (
          <Button
            isBusy={isBusy}
            disabledReason={isOpen ? 'The maps are being computed.' : undefined}
            onClick={() => void refresh()}
          >
            Refresh {open === 1 ? '1 map' : `${open} maps`}
          </Button>
        )}
      </div>
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      <NotCurrent maps={data.maps.filter(({ standing }) => toDo.includes(standing))} />
    </div>
  );
}

function NotCurrent({ maps }: { maps: MapState[] }) {
  if (maps.length === 0) {
    return (
      <p className="py-2 text-ink3">Every map is what its curves, values and settings give now.</p>
    );
  }
  const sorted = [...maps].sort((a, b) => order.indexOf(a.standing) - order.indexOf(b.standing));
  return (
    <Table caption="Maps that are not current, and why">
      <TableHead>
        <tr>
          <HeadCell>target</HeadCell>
          <HeadCell>state</HeadCell>
          <HeadCell>why</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {sorted.map((map) => (
          <Row key={map.targetId}>
            <Cell isRowHead className="whitespace-nowrap">
              {map.target}
            </Cell>
            <Cell className="whitespace-nowrap">
              <StateMark kind={map.standing === 'failed' ? 'bad' : 'warn'}>
                {standingWords[map.standing]}
              </StateMark>
            </Cell>
            <Cell>{map.words ?? '–'}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

import { StateMark } from '@/components/ui/state-mark';

/** Whether a version is offered to all; one that is not may well be used by an analysis. */
export function SharedMark({ isShared }: { isShared: boolean }) {
  return isShared ? (
    <StateMark kind="ok">Shared with all</StateMark>
  ) : (
    <StateMark kind="draft">Not shared</StateMark>
  );
}

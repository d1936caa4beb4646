import type { ReleasePage } from '@/lib/schemas/release-page';

/** The identifier of the copy in an open repository, under the citation. */
export function DepositLine({ deposit }: { deposit: NonNullable<ReleasePage['deposit']> }) {
  if (deposit.isPractice) {
    return (
      <p className="mt-2 max-w-[80ch] text-ink3 text-note [overflow-wrap:anywhere]">
        A practice copy has the identifier doi:{deposit.doi}, which leads nowhere and stands in no
        citation.
      </p>
    );
  }
  return (
    <p className="mt-2 max-w-[80ch] text-note [overflow-wrap:anywhere]">
      A copy is kept in an open repository:{' '}
      <a href={`https://doi.org/${deposit.doi}`}>doi:{deposit.doi}</a>
    </p>
  );
}

'use client';

import { useState } from 'react';
import { useShares } from '@/components/hooks/use-sharing';
import { Button } from '@/components/ui/button';
import type { Shares } from '@/lib/schemas/sharing';
import type { SurveyView } from '@/lib/schemas/surveys';
import { OfferDialog } from './offer-dialog';
import { ShareList } from './share-list';

/** To whom a survey is offered, and by whom it is used. */
export function SurveySharing({
  collaboration,
  survey,
  initial,
}: {
  collaboration: string;
  survey: SurveyView;
  initial: Shares;
}) {
  const { data = initial, mutate } = useShares(collaboration, initial);
  const [isOffering, setOffering] = useState(false);
  const shares = data.shares.filter(
    (share) => share.direction === 'given' && share.survey.slug === survey.slug,
  );
  return (
    <div className="py-3">
      {survey.can.offer && <Button onClick={() => setOffering(true)}>Offer this survey</Button>}
      {shares.length === 0 ? (
        <p className="py-3 text-ink3">
          Not shared. Another collaboration that accepts an offer works with a read-only copy, names
          its source in every result, and can be asked to stop.
        </p>
      ) : (
        <ShareList collaboration={collaboration} shares={shares} onChanged={() => void mutate()} />
      )}
      {isOffering && (
        <OfferDialog
          collaboration={collaboration}
          survey={survey}
          onClose={() => setOffering(false)}
          onOffered={() => void mutate()}
        />
      )}
    </div>
  );
}

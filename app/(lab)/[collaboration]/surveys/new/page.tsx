import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { SurveyForm } from '@/components/surveys/survey-form';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { may } from '@/lib/access/permissions';

export const metadata: Metadata = { title: 'Add a survey' };

const files = [
  ['Targets', 'the stars with distance, age and magnitude, each with its error'],
  ['Contrast curves', 'one or several a star; or ready completeness maps instead'],
  ['Companions', 'what was found, or a file without rows: zero detections'],
];

/** The files that the next page asks for, with samples. */
function WhatComesNext() {
  return (
    <aside>
      <SectionOpener title="What comes next" context="three files" />
      <ol className="text-note">
        {files.map(([name, what], i) => (
          <li key={name} className="grid grid-cols-[22px_1fr] border-rule border-b py-2">
            <span className="text-ink3">{i + 1}</span>
            <span>
              <b>{name}</b>
              <span className="block text-ink2">{what}</span>
            </span>
          </li>
        ))}
      </ol>
      <p className="mt-3 text-ink2 text-note">
        Each file is read and shown line by line before anything is stored. When targets and curves
        are in, the completeness maps are computed by themselves.
      </p>
    </aside>
  );
}

export default async function NewSurveyPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  return (
    <>
      <PageTitle
        title="Add a survey"
        crumbs={[{ href: `/${actor.collaboration}/surveys`, label: 'Surveys' }, { label: 'new' }]}
        context="You lead it until somebody else does; files come in the next step"
      />
      <div className="mt-2">
        {may(actor, 'create-survey') ? (
          <div className="grid gap-x-14 gap-y-9 xl:grid-cols-[minmax(0,1fr)_400px]">
            <SurveyForm collaboration={actor.collaboration} />
            <WhatComesNext />
          </div>
        ) : (
          <Notice tone="neutral" icon="lock" title="A collaborator or an owner adds surveys.">
            You can read every survey, copy its analyses and run the copies.
          </Notice>
        )}
      </div>
    </>
  );
}

import type { Metadata } from 'next';
import { FieldTable } from '@/components/api/field-table';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { guideShapes } from '@/lib/schemas/api-guide';
import { apiGuide } from '../guide';

export const metadata: Metadata = { title: 'Shapes, API' };

export default function ApiShapesPage() {
  return (
    <>
      <PageTitle
        title="Shapes"
        crumbs={[{ href: '/api-guide', label: 'API' }, { label: 'Shapes' }]}
        context="What bodies and answers are made of, by name"
      />
      <div className="grid gap-x-14 gap-y-10 xl:grid-cols-2">
        {guideShapes(apiGuide().document).map(({ name, fields }) => (
          <section key={name} aria-labelledby={name} className="min-w-0">
            <SectionOpener id={name} title={name} />
            <FieldTable caption={`Fields of ${name}`} fields={fields} />
          </section>
        ))}
      </div>
    </>
  );
}

import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { Plate } from '@/components/ui/plate';
import type { ListedPopulation } from '@/lib/schemas/populations';
import { VersionList } from './version-list';

interface StoredPopulationProps {
  collaboration: string;
  versions: ListedPopulation[];
  version: ListedPopulation;
}

/** A population in words, where no control can follow its law. */
export function StoredPopulation({ collaboration, versions, version }: StoredPopulationProps) {
  return (
    <>
      <PageTitle
        title={version.name}
        crumbs={[
          { href: `/${collaboration}/populations`, label: 'Populations' },
          { label: `${version.key}, version ${version.version}` },
        ]}
        actions={
          <LinkButton
            href={`/${collaboration}/analyses/new?population=${version.id}`}
            icon="forward"
          >
            Use in an analysis
          </LinkButton>
        }
      />
      <div className="grid gap-7 pb-10">
        <Notice tone="warn" title="Shown in words.">
          The controls of this page know plain power laws only. A new version of this population
          comes through the API or from a file.
        </Notice>
        <Plate>
          <p className="statement">{version.words}</p>
        </Plate>
        <VersionList collaboration={collaboration} versions={versions} shown={version} />
      </div>
    </>
  );
}

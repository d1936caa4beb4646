import { formatDay } from '@/components/runs/time-words';
import { FormulaWords } from '@/components/ui/formula-words';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import type { ReleasePage as Page, ShownRun } from '@/lib/schemas/release-page';
import { CopyText } from './copy-text';
import { DepositLine } from './deposit-line';
import { LevelConsole } from './level-console';
import { LimitsTable } from './limits-table';
import { ReleaseFiles } from './release-files';
import { ReleaseMap } from './release-map';
import { ReleasePlate } from './release-plate';
import { ReleaseSeal } from './release-seal';
import { fileAddress, sizeWords } from './release-words';

function Head({ page }: { page: Page }) {
  const bundle = page.files.find(({ mediaType }) => mediaType === 'application/zip');
  const code = page.address?.split('/').at(-1) ?? '';
  return (
    <div className="mb-4 flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
      <div className="min-w-0 max-w-[820px]">
        <p className="mb-1 flex flex-wrap items-center gap-x-2 text-ink3 text-note">
          {page.published ? (
            <StateMark kind={page.withdrawn ? 'stopped' : 'released'}>Release {page.key}</StateMark>
          ) : (
            <StateMark kind={page.kind === 'run' ? 'frozen' : 'draft'}>
              {page.kind === 'run' ? page.key : `Draft of release ${page.key}`}
            </StateMark>
          )}
          {page.publishedAt !== null && (
            <span>· {formatDay(page.publishedAt)} · cannot change</span>
          )}
        </p>
        <h1 className="text-balance font-light text-title tracking-[-0.012em] max-md:text-statement">
          {page.title}
        </h1>
        <p className="mt-1.5 text-ink2">
          {page.collaboration}
          {page.authors.length > 0 && ': '}
          {page.authors.map((author, i) => (
            <span key={author.name}>
              {i > 0 && ', '}
              {author.orcid ? (
                <a href={`https://orcid.org/${author.orcid}`} title={`ORCID iD ${author.orcid}`}>
                  {author.name}
                </a>
              ) : (
                author.name
              )}
              {author.affiliation && <span className="text-ink3"> ({author.affiliation})</span>}
            </span>
          ))}
        </p>
      </div>
      {bundle && (
        <div className="flex flex-wrap items-center gap-3 print:hidden">
          {page.address !== null && <CopyText text={page.address} label="Copy address" />}
          <LinkButton
            href={fileAddress(code, bundle.name)}
            icon="download"
            variant="primary"
            isDownload
          >
            Bundle, {sizeWords(bundle.byteLength)}
          </LinkButton>
        </div>
      )}
    </div>
  );
}

function Bars({ page }: { page: Page }) {
  return (
    <div className="mb-4 grid gap-2 empty:hidden">
      {page.withdrawn && (
        <Notice tone="bad" title={`Withdrawn on ${formatDay(page.withdrawn.at)}.`}>
          {page.withdrawn.reason}
        </Notice>
      )}
      {page.replacedBy && (
        <Notice
          tone="warn"
          title={`A newer release replaces this one: ${page.replacedBy.key}.`}
          actions={<a href={`/r/${page.replacedBy.code}`}>Read {page.replacedBy.key}</a>}
        />
      )}
      {!page.published && (
        <Notice
          tone="warn"
          title={page.kind === 'run' ? 'Not a release.' : 'A draft: nobody may cite it.'}
        >
          You read it by a private link. What is here may change before it is published, or never
          be.
        </Notice>
      )}
    </div>
  );
}

function RunParts({ run, number }: { run: ShownRun; number: number }) {
  return (
    <>
      <section className="min-w-0">
        <SectionOpener
          number={number}
          title={`Mean completeness, ${run.result.stars} stars`}
          context={run.surveys.join(', ')}
        />
        <ReleaseMap run={run} />
      </section>
      <section className="min-w-0">
        <SectionOpener
          number={number + 1}
          title="Methods paragraph"
          tools={
            <>
              <CopyText text={run.methods.text} label="Copy text" />
              <CopyText text={run.methods.latex} label="Copy LaTeX" />
            </>
          }
        />
        <p className="max-w-[72ch] whitespace-pre-wrap text-ink2 [overflow-wrap:anywhere]">
          <FormulaWords text={run.methods.text.trim()} />
        </p>
      </section>
    </>
  );
}

/** A release as anybody reads it, and a draft or a frozen run as a guest does. */
export function ReleasePage({ page }: { page: Page }) {
  const [first, ...others] = page.runs;
  const code = page.address?.split('/').at(-1) ?? '';
  const side = (
    <div className="grid content-start gap-8">
      <ReleaseFiles files={page.files} code={code} />
      <ReleaseSeal page={page} />
    </div>
  );
  return (
    <article>
      <Head page={page} />
      <Bars page={page} />
      {page.abstract !== '' && (
        <p className="mb-5 max-w-[80ch] whitespace-pre-wrap text-ink2">{page.abstract}</p>
      )}
      {first && (
        <>
          <ReleasePlate run={first} />
          <div className="mt-7 grid gap-x-10 gap-y-8 lg:grid-cols-[minmax(0,2fr)_minmax(0,1fr)] print:grid-cols-[minmax(0,2fr)_minmax(0,1fr)] print:gap-x-6">
            <section className="min-w-0">
              <SectionOpener
                number={1}
                title={
                  first.result.quantity === 'host_fraction'
                    ? 'Upper limits on the host fraction'
                    : 'Upper limits on the number of planets'
                }
              />
              <LimitsTable runs={page.runs} />
              <LevelConsole run={first} />
            </section>
            {side}
          </div>
          <div className="release-second mt-8 grid gap-x-10 gap-y-8 lg:grid-cols-2 print:mt-0">
            <RunParts run={first} number={2} />
          </div>
          {others.map((run) => (
            <section key={run.id} className="mt-10">
              <h2 className="mb-3 text-section">{run.result.statement.sentence}</h2>
              <p className="mb-4 text-ink3 text-note">
                {run.name}: {run.result.statement.conditions.join('; ')}.
              </p>
              <div className="grid gap-x-10 gap-y-8 lg:grid-cols-2">
                <RunParts run={run} number={2} />
              </div>
            </section>
          ))}
        </>
      )}
      {!first && <div className="mt-6 grid gap-8 lg:grid-cols-2">{side}</div>}
      {page.citation && (
        <section className="mt-8 min-w-0">
          <SectionOpener
            number={4}
            title="Citation"
            tools={
              <>
                <CopyText text={page.citation.bibtex} label="Copy BibTeX" />
                <CopyText text={page.citation.text} label="Copy text" />
              </>
            }
          />
          <p className="max-w-[80ch] text-ink2 [overflow-wrap:anywhere]">{page.citation.text}</p>
          {page.deposit && <DepositLine deposit={page.deposit} />}
        </section>
      )}
      {(page.note !== '' || page.licence !== null) && (
        <p className="mt-6 max-w-[80ch] whitespace-pre-wrap text-ink3 text-note">
          {page.note}
          {page.note !== '' && ' '}
          {page.licence !== null && `Licence: ${page.licence}.`}
        </p>
      )}
    </article>
  );
}

import { describe, expect, it } from 'vitest';
import { drawPosterior } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/exports/[file]/posterior-drawing';
import { type FinishedRun, writeLimitsTable } from '@/lib/services/export-limits';
import { runProvenance } from '@/lib/services/exports/provenance';
import { buildExportRun } from '../../support/export-run';

const run = buildExportRun();
const release: FinishedRun['release'] = {
  title: 'Giant planets',
  version: 1,
  licence: 'CC-BY-4.0',
  address: 'https://rarebound.example/r/abc',
  year: 2026,
  authors: [{ name: 'I. Marrand' }],
};
const filesOf = (of: FinishedRun) => [
  drawPosterior(of, 180),
  writeLimitsTable(of, 'deluxetable'),
  JSON.stringify(runProvenance(of)),
];

describe('files of a run', () => {
  it('call a draft a draft', () => {
    for (const text of filesOf(run)) expect(text).toMatch(/draft, run \d|Draft, run \d/);
  });

  it('never call a frozen or released run a draft', () => {
    for (const text of filesOf({ ...run, isFrozen: true })) {
      expect(text).toMatch(/frozen/i);
      expect(text).not.toMatch(/draft|not frozen/i);
    }
    for (const text of filesOf({ ...run, isFrozen: true, release })) {
      expect(text).toMatch(/release/i);
      expect(text).not.toMatch(/draft|not frozen/i);
    }
  });
});

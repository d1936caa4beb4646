import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { helpDrawing, helpGroups, helpWordNames, helpWords, isHelpWord } from '@/lib/help';
import { typesetFormula, typesetParagraph } from '@/lib/help/typeset';
import { uploadLimitWords } from '@/lib/help/upload-limits';

/** Words of the product that everybody uses, and quantities that its screens show. */
const promised = [
  ...['star', 'survey', 'target', 'entry', 'contrast-curve', 'completeness-map'],
  ...['depth-of-search', 'detection-probability', 'candidate', 'companion', 'background'],
  ...['detection', 'population', 'range', 'host-fraction', 'occurrence-rate', 'prior'],
  ...['likelihood', 'posterior', 'credible-level', 'upper-limit', 'cooling-model'],
  ...['cooling-start', 'adopted-values', 'analysis', 'run', 'frozen', 'release', 'fingerprint'],
  ...['completeness', 'classical-limit', 'feldman-cousins', 'index-convention', 'shared-stars'],
  ...['small-sample', 'evidence', 'influence', 'forecast', 'coverage', 'upload-limits'],
];

describe('the help', () => {
  it('explains every word that it promises', () => {
    expect(promised.filter((word) => !isHelpWord(word))).toEqual([]);
  });

  it.each(helpWordNames)('%s has all its parts', (word) => {
    const entry = helpWords[word];
    expect(entry.title).not.toBe('');
    expect(Object.keys(helpGroups)).toContain(entry.group);
    expect(entry.definition.length).toBeGreaterThan(60);
    expect(entry.definition).not.toContain('\n');
    expect(entry.units).not.toBe('');
    expect(entry.source).not.toBe('');
    expect(entry.formulas.length > 0).toBe(entry.kind === 'quantity');
    expect(entry.seeAlso.length).toBeGreaterThan(0);
    expect(entry.seeAlso.filter((other) => !isHelpWord(other) || other === word)).toEqual([]);
  });

  it.each(helpWordNames)('sets every formula of %s without a fault', (word) => {
    const { definition, formulas } = helpWords[word];
    for (const { tex, reads } of formulas) {
      const html = typesetFormula(tex);
      expect(html).toContain('<math');
      expect(html).not.toContain('katex-error');
      expect(reads).not.toBe('');
    }
    for (const part of typesetParagraph(definition)) expect(part.text).not.toContain('\\(');
  });

  it('refuses a formula that cannot be set or is not closed', () => {
    expect(() => typesetFormula('\\frac{1}{')).toThrow();
    expect(() => typesetFormula('\\nosuchcommand')).toThrow();
    expect(() => typesetParagraph('a $b')).toThrow('not closed');
  });

  it('draws every figure inside its axes', () => {
    const figures = helpWordNames.flatMap((word) => helpWords[word].figure ?? []);
    expect(figures.length).toBeGreaterThan(10);
    for (const name of figures) {
      const { x, y, curves, caption } = helpDrawing(name);
      expect(caption).not.toBe('');
      for (const curve of curves) {
        expect(curve.x.length).toBe(curve.y.length);
        const inside = (value: number, [from, to]: readonly [number, number]) =>
          value >= Math.min(from, to) - 1e-9 && value <= Math.max(from, to) + 1e-9;
        expect(
          curve.x.every((value) => inside(value, x.domain)),
          name,
        ).toBe(true);
        expect(
          curve.y.every((value) => inside(value, y.domain)),
          name,
        ).toBe(true);
      }
    }
    expect(() => helpDrawing('nothing')).toThrow('nothing');
  });

  it('draws the limits that statistics.md states: floor 1e-3 and 1e-6 at an exposure of 25', () => {
    // statistics.md, section 9: 0.0483 and 0.0221; uniform 0.1198.
    const [logUniform, uniform] = helpDrawing('floor').curves;
    const at = (floor: number) =>
      logUniform.y[logUniform.x.findIndex((x) => Math.abs(x / floor - 1) < 1e-9)];
    expect(at(1e-3)).toBeCloseTo(0.0483, 4);
    expect(at(1e-6)).toBeCloseTo(0.0221, 4);
    expect(uniform.y[0]).toBeCloseTo(0.1198, 4);
  });

  it('makes the limits of uploads from the one table', () => {
    expect(uploadLimitWords()).toContain('512 MiB');
    expect(helpWords['upload-limits'].definition).toContain(uploadLimitWords());
  });

  it('has an entry for every mark on the screens', () => {
    const files = ['app', 'components'].flatMap((room) =>
      readdirSync(room, { recursive: true, encoding: 'utf8' })
        .filter((file) => file.endsWith('.tsx'))
        .map((file) => `${room}/${file}`),
    );
    const marks = files.flatMap((file) =>
      [
        ...readFileSync(file, 'utf8').matchAll(
          /<Help(?:Mark|Link) word="([^"]*)"|\bhelp(?:: '|=")([a-z-]+)['"]/g,
        ),
      ].map(([, word, named]) => ({ file, word: word ?? named })),
    );
    expect(marks.length).toBeGreaterThan(25);
    expect(marks.filter(({ word }) => !isHelpWord(word))).toEqual([]);
  });
});

import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { MapRuleFields, readMapRules } from '@/components/surveys/map-rule-fields';
import { describeMapSettings } from '@/components/surveys/map-setting-words';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';

const plain = mapSettingsSchema.parse({});
const full = mapSettingsSchema.parse({
  smallSample: { fwhmArcsec: 0.06 },
  unstableZone: 'remove',
  candidates: 'cut',
  candidateHalfWidthArcsec: 0.2,
  fieldAge: { minMyr: 200, maxMyr: 5000 },
});

/** What a browser sends of the markup: every field with its value. */
function formOf(markup: string): FormData {
  const form = new FormData();
  for (const [, attributes] of markup.matchAll(/<input([^>]*)>/g)) {
    const name = /name="([^"]*)"/.exec(attributes)?.[1] as string;
    form.set(name, /value="([^"]*)"/.exec(attributes)?.[1] ?? '');
  }
  for (const [, name, options] of markup.matchAll(
    /<select[^>]*name="([^"]*)"[^>]*>(.*?)<\/select>/g,
  )) {
    form.set(name, /value="([^"]*)" selected/.exec(options)?.[1] as string);
  }
  return form;
}

describe('rules of the maps on the form', () => {
  it.each([
    ['switched off', plain],
    ['switched on', full],
  ])('come back as they went in: %s', (_, settings) => {
    const rules = readMapRules(
      formOf(renderToStaticMarkup(createElement(MapRuleFields, { settings }))),
    );
    expect(mapSettingsSchema.parse({ ...plain, ...rules })).toEqual(settings);
  });

  it('a field age with one end is refused by its schema, not dropped', () => {
    const form = formOf(renderToStaticMarkup(createElement(MapRuleFields, { settings: full })));
    form.set('fieldAgeMax', '');
    expect(mapSettingsSchema.safeParse({ ...plain, ...readMapRules(form) }).success).toBe(false);
  });

  it('each field says in a sentence what it does', () => {
    const markup = renderToStaticMarkup(createElement(MapRuleFields, {}));
    expect(markup.match(/<(input|select)[^>]*aria-describedby/g)).toHaveLength(6);
  });
});

describe('one line about the maps', () => {
  it('names the rules that are on and no others', () => {
    expect(describeMapSettings(plain, null)).toBe(
      'approximate cooling law; eccentricities uniform from 0 to 0.95; smooth threshold',
    );
    expect(describeMapSettings(full, null)).toContain(
      'thresholds raised for elements of 0.06″; unstable orbits taken out; cut 0.2″ around candidates; field age 200–5000 Myr',
    );
  });
});

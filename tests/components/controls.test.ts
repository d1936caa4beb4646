import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { placeRangeEnd } from '@/components/charts/range-box';
import {
  snapToStep,
  TraceSlider,
  traceValueText,
  typedNumber,
} from '@/components/charts/trace-slider';
import { Button } from '@/components/ui/button';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { TextField } from '@/components/ui/text-field';
import { readTheme } from '@/components/ui/theme';
import { formatPercent } from '@/lib/quantities/display';

const trace = {
  parameter: Float64Array.of(-2, 0, 2),
  limit: Float64Array.of(0.05, 0.06, 0.08),
};

const slider = {
  name: 'Semi-major-axis index',
  symbol: 'β',
  trace,
  value: 0.6,
  min: -2,
  max: 2,
  step: 0.1,
  onChange: () => {},
  formatLimit: (limit: number) => formatPercent(limit),
  levelWords: 'at 95 per cent',
};

describe('TraceSlider', () => {
  it('speaks its value and what it would give', () => {
    expect(traceValueText(slider)).toBe('β 0.6, limit below 6.6 per cent at 95 per cent');
  });

  it('is a real range input with that sentence', () => {
    const markup = renderToStaticMarkup(createElement(TraceSlider, slider));
    expect(markup).toMatch(/<input[^>]*type="range"/);
    expect(markup).toContain('aria-valuetext="β 0.6, limit below 6.6 per cent at 95 per cent"');
  });

  it('shows the saved place only while it differs', () => {
    const draw = (savedValue: number) =>
      renderToStaticMarkup(createElement(TraceSlider, { ...slider, savedValue }));
    expect(draw(-1)).toContain('saved-dot');
    expect(draw(0.6)).not.toContain('saved-dot');
  });

  it('speaks the value alone while the trace is being computed', () => {
    expect(traceValueText({ ...slider, trace: undefined })).toBe('β 0.6');
  });
});

describe('snapToStep', () => {
  it('keeps to the steps and to the ends', () => {
    expect(snapToStep(0.4499, -2, 2, 0.1)).toBe(0.4);
    expect(snapToStep(-7, -2, 2, 0.1)).toBe(-2);
    expect(snapToStep(99.96, 50, 99.9, 0.1)).toBe(99.9);
  });
});

describe('typedNumber', () => {
  it('takes what lies between the ends, off the steps, and nothing else', () => {
    expect(typedNumber('99.7', [0.01, 99.99])).toBe(99.7);
    expect(typedNumber('−1,25', [-2.5, 0.5])).toBe(-1.25);
    for (const text of ['−9', '0.6', 'abc', ' ', '']) {
      expect(typedNumber(text, [-2.5, 0.5])).toBeUndefined();
    }
  });
});

describe('placeRangeEnd', () => {
  const range = {
    massMinMjup: 2,
    massMaxMjup: 30,
    semiMajorAxisMinAu: 20,
    semiMajorAxisMaxAu: 300,
  };
  const bounds = {
    massMinMjup: 0.5,
    massMaxMjup: 80,
    semiMajorAxisMinAu: 1,
    semiMajorAxisMaxAu: 1000,
  };

  it('quotes an end to two digits', () => {
    expect(placeRangeEnd(range, 'semiMajorAxisMinAu', 23.7, bounds).semiMajorAxisMinAu).toBe(24);
  });

  it('never passes the other end or the map', () => {
    const low = placeRangeEnd(range, 'massMinMjup', 500, bounds);
    expect(low.massMinMjup).toBeLessThan(low.massMaxMjup);
    expect(placeRangeEnd(range, 'massMaxMjup', 500, bounds).massMaxMjup).toBe(80);
    expect(placeRangeEnd(range, 'massMaxMjup', 30, bounds)).toEqual(range);
  });
});

describe('ConsequenceSwitch', () => {
  it('gives each option the limit that it would give, and checks the chosen one', () => {
    const markup = renderToStaticMarkup(
      createElement(ConsequenceSwitch<'hot' | 'cold'>, {
        label: 'Cooling model',
        value: 'hot',
        onChange: () => {},
        options: [
          { value: 'hot', label: 'hot', consequence: '5.8' },
          { value: 'cold', label: 'cold', consequence: '8.5' },
        ],
      }),
    );
    expect(markup).toContain('<legend');
    expect(markup.match(/type="radio"/g)).toHaveLength(2);
    expect(markup).toMatch(/value="hot"[^>]*checked|checked=""[^>]*value="hot"/);
    expect(markup).toContain('gives </span>8.5');
  });
});

describe('Button', () => {
  it('keeps its place in the order of focus when it is refused, and says why', () => {
    const markup = renderToStaticMarkup(
      createElement(Button, { disabledReason: 'Only an author can freeze a result' }, 'Freeze'),
    );
    expect(markup).toContain('aria-disabled="true"');
    expect(markup).not.toMatch(/<button[^>]* disabled/);
    const id = /aria-describedby="([^"]*)"/.exec(markup)?.[1];
    expect(markup).toContain(`id="${id}" role="tooltip"`);
    expect(markup).toContain('Only an author can freeze a result');
  });
});

describe('TextField', () => {
  it('ties label and error to the input', () => {
    const markup = renderToStaticMarkup(
      createElement(TextField, { label: 'E-mail', error: 'found "a", expected an address' }),
    );
    const id = /<input id="([^"]*)"/.exec(markup)?.[1];
    expect(markup).toContain(`for="${id}"`);
    expect(markup).toContain(`aria-describedby="${id}-note"`);
    expect(markup).toContain('aria-invalid="true"');
  });
});

describe('readTheme', () => {
  it('takes a cookie that it does not know for the system', () => {
    expect(readTheme('dark')).toBe('dark');
    expect(readTheme('"><script>')).toBe('system');
    expect(readTheme(undefined)).toBe('system');
  });
});

import { inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { readDrawing } from '@/lib/formats/figure/read-drawing';
import { writePdf } from '@/lib/formats/figure/write-pdf';

const figure = (content: string, head = 'width="88mm" viewBox="0 0 432 200"') =>
  `<svg xmlns="http://www.w3.org/2000/svg" ${head}><title>Posterior of A-31</title><desc>a limit</desc>${content}</svg>`;

const everyMark = figure(`
  <defs>
    <pattern id="h" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><line x1="0" x2="0" y1="0" y2="5" stroke="#c2390d" stroke-width="1.4px"/></pattern>
    <clipPath id="c"><rect x="0" y="0" width="300" height="150"/></clipPath>
  </defs>
  <g transform="translate(14 36)">
    <g clip-path="url(#c)"><path d="M0,100C20,20,40,20,60,100Z" fill="#117878" fill-opacity="0.2"/><path d="M60,100L90,80L90,100Z" fill="url(#h)"/></g>
    <line x1="0" x2="300" y1="100" y2="100" stroke="#344d4f" stroke-dasharray="2px, 3px"/>
    <circle cx="20" cy="20" r="4" fill="none" stroke="#0b2326"/>
    <text x="100" y="121" font-size="13px" fill="#344d4f" text-anchor="middle">0.5 M<tspan dy="3" font-size="9.5px">J</tspan></text>
    <text x="200" y="60" font-size="13px" font-style="italic" fill="#344d4f" paint-order="stroke" stroke="#ffffff" stroke-width="5px">α = −0.9, Ĉ</text>
    <text x="200" y="90" font-size="16px" font-weight="600" fill="#ffffff">&lt;5.8 % (95 %)</text>
  </g>`);

/** Everything that a PDF says uncompressed. */
function contentOf(pdf: Uint8Array): string {
  const raw = Buffer.from(pdf).toString('latin1');
  const streams = [...raw.matchAll(/stream\r?\n([\s\S]*?)\r?\nendstream/g)].flatMap(([, body]) => {
    try {
      return [inflateSync(Buffer.from(body, 'latin1')).toString('latin1')];
    } catch {
      return [];
    }
  });
  return streams.join('\n');
}

describe('writePdf', () => {
  it('embeds subsets of the typeface, upright, italic and semibold', async () => {
    const raw = Buffer.from(await writePdf(readDrawing(everyMark))).toString('latin1');
    const fonts = new Set(
      [...raw.matchAll(/\/FontName \/[A-Z]{6}\+(\S+)/g)].map(([, name]) => name),
    );
    expect(fonts.size).toBeGreaterThanOrEqual(3);
    expect([...fonts].every((name) => name.startsWith('SourceSans3'))).toBe(true);
    expect(raw.match(/\/FontFile[23] /g)?.length).toBeGreaterThanOrEqual(3);
    expect(raw).not.toMatch(/\/Subtype \/Image/);
  });

  it('is as wide as the column asks for', async () => {
    const raw = Buffer.from(await writePdf(readDrawing(everyMark))).toString('latin1');
    const [, width, height] = /\/MediaBox \[0 0 ([\d.]+) ([\d.]+)\]/.exec(raw) ?? [];
    expect(Number(width)).toBeCloseTo((88 * 72) / 25.4, 2);
    expect(Number(height) / Number(width)).toBeCloseTo(200 / 432, 4);
  });

  it('draws every space, sign and letter that the product writes, and none that no file has', async () => {
    const signs = [
      '5.8\u2009%',
      '10\u00a0AU\u202f',
      '≤ ≥ ∝ → ←',
      'αβμσχ²Ĉ′″×±−',
      'Žižek Łódź Ωж',
      '漢',
    ];
    const words = signs.map(
      (sign, row) =>
        `<text x="4" y="${20 * row + 20}" font-size="13" fill="#0b2326" paint-order="stroke" stroke="#ffffff" stroke-width="3">${sign}</text>`,
    );
    const pdf = await writePdf(readDrawing(figure(words.join(''))));
    expect(Buffer.from(pdf).subarray(0, 5).toString()).toBe('%PDF-');
  });

  it('keeps the character of every glyph, those that are parts of others too', async () => {
    const colon = figure(
      '<text x="4" y="20" font-size="13" fill="#0b2326" paint-order="stroke" stroke="#ffffff" stroke-width="3">ij: 5.8</text>',
    );
    const map = contentOf(await writePdf(readDrawing(colon)));
    expect(map).toContain('begincmap');
    expect(map).toContain('<002e>');
    expect(map).not.toContain('<>');
  });

  it('gives the same bytes for the same drawing', async () => {
    const [one, other] = await Promise.all([0, 1].map(() => writePdf(readDrawing(everyMark))));
    expect(Buffer.compare(one, other)).toBe(0);
  });

  it('draws text as text, and cuts a hatch to its shape', async () => {
    const content = contentOf(await writePdf(readDrawing(everyMark)));
    expect(content.match(/\bTJ\b|\bTj\b/g)?.length).toBeGreaterThanOrEqual(4);
    expect(content).toMatch(/W n|W\* n|W\nn/);
  });
});

describe('readDrawing', () => {
  it.each([
    ['a script', '<script>1</script>', /element: found script/],
    ['an image', '<image href="http://a.example/b.png"/>', /element: found image/],
    ['a colour by name of a token', '<rect width="9" height="9" fill="var(--ink)"/>', /colour/],
    ['a path that is none', '<path d="M0,0 url(x)"/>', /path/],
    ['a hatch that nothing draws', '<rect width="9" height="9" fill="url(#gone)"/>', /hatch/],
    ['what is no XML', '<g>', /well-formed/],
  ])('refuses %s', (_, content, words) => {
    expect(() => readDrawing(figure(content))).toThrow(words);
  });

  it('refuses a document type, and a figure without a width in mm', () => {
    expect(() => readDrawing(`<!DOCTYPE svg [<!ENTITY a "b">]>${figure('')}`)).toThrow(/type/);
    expect(() => readDrawing(figure('', 'width="88" viewBox="0 0 9 9"'))).toThrow(/mm/);
    expect(() => readDrawing(figure('', 'width="88mm" viewBox="-1 0 9 9"'))).toThrow(/viewBox/);
  });

  it('hands down what a group says, and shifts what a tspan lowers', () => {
    const { marks } = readDrawing(
      figure(
        '<g fill="#117878" opacity="0.5" transform="translate(3 4) scale(2)"><text x="1" y="2" font-size="10">M<tspan dy="0.3em">J</tspan></text></g>',
      ),
    );
    expect(marks).toMatchObject([
      {
        ...{ kind: 'text', matrix: [2, 0, 0, 2, 3, 4], x: 1, y: 2 },
        runs: [
          { text: 'M', dy: 0, colour: '#117878', opacity: 0.5 },
          { text: 'J', dy: 3 },
        ],
      },
    ]);
  });
});

import { join } from 'node:path';

/** Scripts of the typeface, each a file; the first that has a character draws it. */
const scripts = [
  'latin',
  'greek',
  'latin-ext',
  'greek-ext',
  'cyrillic',
  'cyrillic-ext',
  'vietnamese',
] as const;

interface Look {
  isBold: boolean;
  isItalic: boolean;
}

/** What a document does with a typeface, apart from drawing. */
interface FontBook {
  font(file: string): unknown;
  /** The font last chosen, as fontkit holds it. */
  readonly _font: { font: FontFile };
}

export interface FontFile {
  unitsPerEm: number;
  hasGlyphForCodePoint(codePoint: number): boolean;
  layout(text: string): {
    glyphs: { path: { toSVG(): string } }[];
    positions: { xAdvance: number; xOffset: number; yOffset: number }[];
  };
}

/** Written in words where the typeface has no sign of its own. */
const spelled: Record<string, string> = {
  '≤': 'at most ',
  '≥': 'at least ',
  '∝': '~',
  '→': 'to',
  '←': 'from',
  '☉': 'Sun',
  '\u202f': '\u2009',
};

function fileOf(script: string, { isBold, isItalic }: Look): string {
  const name = `source-sans-3-${script}-${isBold ? 600 : 400}-${isItalic ? 'italic' : 'normal'}.woff`;
  return join(process.cwd(), 'node_modules', '@fontsource', 'source-sans-3', 'files', name);
}

export interface Piece {
  text: string;
  file: string;
}

/**
 * A text in pieces that one file each can draw, since the typeface comes as one file a script.
 *
 * A character that no file has is spelled or becomes a question mark.
 */
export function piecesOf(document: FontBook, text: string, look: Look): Piece[] {
  const pieces: Piece[] = [];
  const known = [...text].map((character) => spelled[character] ?? character).join('');
  for (const character of known) {
    const code = character.codePointAt(0) ?? 0;
    const script = scripts.find((one) => {
      document.font(fileOf(one, look));
      return document._font.font.hasGlyphForCodePoint(code);
    });
    const file = fileOf(script ?? 'latin', look);
    const drawn = script === undefined ? '?' : character;
    const last = pieces.at(-1);
    if (last?.file === file) last.text += drawn;
    else pieces.push({ text: drawn, file });
  }
  return pieces;
}

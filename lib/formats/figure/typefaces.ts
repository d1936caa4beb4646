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
  characterSet: number[];
  hasGlyphForCodePoint(codePoint: number): boolean;
  glyphForCodePoint(codePoint: number): unknown;
  layout(text: string): {
    glyphs: { path: { toSVG(): string } }[];
    positions: { xAdvance: number; xOffset: number; yOffset: number }[];
  };
}

/**
 * Spaces of any width are drawn as the plain one, which is as wide as the thin one here: the others
 * have an empty outline at the end of their file, which the reader of fonts runs past.
 */
const spaces = /[\u00a0\u2000-\u200a\u202f]/g;

/** Written in words where the typeface has no sign of its own. */
const spelled: Record<string, string> = {
  '≤': 'at most ',
  '≥': 'at least ',
  '∝': '~',
  '→': 'to',
  '←': 'from',
  '☉': 'Sun',
};

function fileOf(script: string, { isBold, isItalic }: Look): string {
  const name = `source-sans-3-${script}-${isBold ? 600 : 400}-${isItalic ? 'italic' : 'normal'}.woff`;
  return join(process.cwd(), 'node_modules', '@fontsource', 'source-sans-3', 'files', name);
}

/** What is known of a document's fonts: files that are open, and the file of each character. */
const known = new WeakMap<
  FontBook,
  { open: Set<string>; files: Map<string, string | undefined> }
>();

function fileWith(document: FontBook, character: string, look: Look): string | undefined {
  const fonts = known.get(document) ?? { open: new Set(), files: new Map() };
  known.set(document, fonts);
  const key = `${look.isBold} ${look.isItalic} ${character}`;
  if (!fonts.files.has(key)) {
    const code = character.codePointAt(0) ?? 0;
    const script = scripts.find((one) =>
      openFile(document, fileOf(one, look), fonts.open).hasGlyphForCodePoint(code),
    );
    fonts.files.set(key, script && fileOf(script, look));
  }
  return fonts.files.get(key);
}

/**
 * A letter that is first met as a part of another would stand in the file without its character,
 * and could be seen but not copied: so each is met by its character before anything is drawn.
 */
function openFile(document: FontBook, file: string, open: Set<string>): FontFile {
  document.font(file);
  const { font } = document._font;
  if (!open.has(file)) {
    open.add(file);
    for (const code of font.characterSet) font.glyphForCodePoint(code);
  }
  return font;
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
  const written = [...text.replaceAll(spaces, ' ')]
    .map((character) => spelled[character] ?? character)
    .join('');
  for (const character of written) {
    const found = fileWith(document, character, look);
    const file = found ?? fileOf('latin', look);
    const drawn = found === undefined ? '?' : character;
    const last = pieces.at(-1);
    if (last?.file === file) last.text += drawn;
    else pieces.push({ text: drawn, file });
  }
  return pieces;
}

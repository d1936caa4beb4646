import { uploadLimits } from './limits';
import { type FaultReport, quoteFound } from './reports';

/** A number as the file writes it: identifiers of 19 digits keep every one of them. */
export class JsonNumber {
  constructor(readonly text: string) {}
}
export interface JsonObject {
  keys: string[];
  values: JsonValue[];
  line: number;
}
export interface JsonArray {
  items: JsonValue[];
  line: number;
}
export type JsonValue = string | boolean | null | JsonNumber | JsonObject | JsonArray;

export const isArray = (value: JsonValue | undefined): value is JsonArray =>
  typeof value === 'object' && value !== null && 'items' in value;
export const isObject = (value: JsonValue | undefined): value is JsonObject =>
  typeof value === 'object' && value !== null && 'keys' in value;
export const memberOf = (object: JsonObject, key: string): JsonValue | undefined =>
  object.values[object.keys.indexOf(key)];

/** What a value is, in a word. */
export function kindOf(value: JsonValue | undefined): string {
  if (value === undefined) return 'nothing';
  if (value === null) return 'null';
  if (isArray(value)) return 'a list';
  if (isObject(value)) return 'an object';
  if (value instanceof JsonNumber) return 'a number';
  return typeof value === 'string' ? 'a text' : 'a boolean';
}

const deepest = 32;
const number = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const escapes: Record<string, string> = {
  '"': '"',
  '\\': '\\',
  '/': '/',
  b: '\b',
  f: '\f',
  n: '\n',
  r: '\r',
  t: '\t',
};

/** Neither a control, a quotation mark, a backslash nor the end. */
const isPlain = (code: number) => code >= 32 && code !== 34 && code !== 92;

class StopReading extends Error {}

/** Reads JSON (RFC 8259) keeping numbers as written, lines, and a refusal of repeated keys. */
class JsonReader {
  private at = 0;
  private depth = 0;
  /** Path to the value under way, for places: list positions from 1. */
  private readonly path: (string | number)[] = [];

  constructor(
    private readonly text: string,
    private readonly faults: FaultReport,
  ) {}

  read(): JsonValue {
    const value = this.value();
    this.space();
    if (this.at < this.text.length) this.refuse('the end of the JSON');
    return value;
  }

  private lineAt(at: number): { line: number; column: string } {
    const before = this.text.slice(0, at);
    const line = before.split('\n').length;
    return { line, column: String(at - before.lastIndexOf('\n')) };
  }

  private stop(code: string, fault: Record<string, unknown>): never {
    this.faults.add({ code, ...fault });
    throw new StopReading();
  }

  private refuse(expected: string): never {
    const { line, column } = this.lineAt(this.at);
    const item = `column ${column}`;
    if (this.at >= this.text.length) {
      return this.stop('json-invalid', { line, item, message: 'the JSON ends too early' });
    }
    const word = /^[\w+.-]+/.exec(this.text.slice(this.at))?.[0] ?? this.text[this.at];
    const isWord = /^[-+]?(NaN|Infinity|undefined|None|nan)/.test(word);
    return this.stop('json-invalid', {
      line,
      item,
      found: isWord ? `${word}, which is not JSON` : quoteFound(word),
      expected: isWord ? 'a number or null' : expected,
    });
  }

  private space(): void {
    while (/[ \t\r\n]/.test(this.text[this.at] ?? '')) this.at += 1;
  }

  private value(): JsonValue {
    this.space();
    const first = this.text[this.at];
    if (first === '{' || first === '[') return this.nested(first);
    if (first === '"') return this.string();
    for (const [word, value] of [
      ['true', true],
      ['false', false],
      ['null', null],
    ] as const) {
      if (this.text.startsWith(word, this.at)) {
        this.at += word.length;
        return value;
      }
    }
    number.lastIndex = this.at;
    const match = number.exec(this.text);
    if (match === null || /[\w.]/.test(this.text[this.at + match[0].length] ?? '')) {
      return this.refuse('a value');
    }
    this.at += match[0].length;
    return new JsonNumber(match[0]);
  }

  private nested(opening: '{' | '['): JsonObject | JsonArray {
    this.depth += 1;
    if (this.depth > deepest) {
      const what = opening === '[' ? 'lists' : 'objects';
      this.stop('too-deep', {
        item: 'top level',
        found: `${what} nested more than ${deepest} deep`,
      });
    }
    const { line } = this.lineAtCheap();
    this.at += 1;
    const value = opening === '{' ? this.object(line) : this.array(line);
    this.depth -= 1;
    return value;
  }

  /** Lines are counted from the last nested value, so that reading stays linear. */
  private lineAtCheap(): { line: number } {
    for (; this.counted < this.at; this.counted += 1) {
      if (this.text[this.counted] === '\n') this.line += 1;
    }
    return { line: this.line };
  }
  private counted = 0;
  private line = 1;

  private array(line: number): JsonArray {
    const items: JsonValue[] = [];
    this.space();
    if (this.text[this.at] === ']') {
      this.at += 1;
      return { items, line };
    }
    for (;;) {
      this.path.push(items.length + 1);
      items.push(this.value());
      this.path.pop();
      this.space();
      const next = this.text[this.at];
      if (next !== ',' && next !== ']') this.refuse('"," or "]"');
      this.at += 1;
      if (next === ']') return { items, line };
    }
  }

  private object(line: number): JsonObject {
    const keys: string[] = [];
    const known = new Set<string>();
    const values: JsonValue[] = [];
    this.space();
    if (this.text[this.at] === '}') {
      this.at += 1;
      return { keys, values, line };
    }
    for (;;) {
      this.space();
      if (this.text[this.at] !== '"') this.refuse('a key in quotation marks');
      const key = this.string();
      if (known.has(key)) this.refuseRepeat(key);
      this.space();
      if (this.text[this.at] !== ':') this.refuse('":"');
      this.at += 1;
      this.path.push(key);
      values.push(this.value());
      this.path.pop();
      keys.push(key);
      known.add(key);
      this.space();
      const next = this.text[this.at];
      if (next !== ',' && next !== '}') this.refuse('"," or "}"');
      this.at += 1;
      if (next === '}') return { keys, values, line };
    }
  }

  private refuseRepeat(key: string): never {
    const [first] = this.path;
    return this.stop('json-invalid', {
      item: `${typeof first === 'number' ? `item ${first}, ` : ''}${quoteFound(key)}`,
      message: `the key ${quoteFound(key)} appears twice`,
    });
  }

  private string(): string {
    let text = '';
    this.at += 1;
    for (;;) {
      const start = this.at;
      while (isPlain(this.text.charCodeAt(this.at))) this.at += 1;
      text += this.text.slice(start, this.at);
      const next = this.text[this.at];
      if (next === '"') {
        this.at += 1;
        return text;
      }
      if (next !== '\\') this.refuse('a closing quotation mark');
      text += this.escape();
    }
  }

  private escape(): string {
    const letter = this.text[this.at + 1];
    if (letter in escapes) {
      this.at += 2;
      return escapes[letter];
    }
    const code = /^u([\da-fA-F]{4})/.exec(this.text.slice(this.at + 1, this.at + 6));
    if (!code) return this.refuse('an escape such as \\n or \\u00e9');
    this.at += 6;
    return String.fromCharCode(Number.parseInt(code[1], 16));
  }
}

/** Reads JSON text; null where it is none, with the fault at its line and column. */
export function parseJsonText(bytes: Uint8Array, faults: FaultReport): { value: JsonValue } | null {
  if (bytes.length > uploadLimits.jsonBytes) {
    const most = uploadLimits.jsonBytes / 2 ** 20;
    faults.add({ code: 'too-large', message: `the JSON is larger than ${most} MiB` });
    return null;
  }
  try {
    return { value: new JsonReader(new TextDecoder('utf-8').decode(bytes), faults).read() };
  } catch (error) {
    if (error instanceof StopReading) return null;
    throw error;
  }
}

import { textWidth } from './text-width';

/** A name cut where it would leave its place; the table beside the chart holds the whole of it. */
export function fitText(text: string, widthPx: number, fontSizePx = 13): string {
  if (textWidth(text, fontSizePx) <= widthPx) return text;
  let end = text.length;
  while (end > 1 && textWidth(`${text.slice(0, end).trimEnd()}…`, fontSizePx) > widthPx) end -= 1;
  return `${text.slice(0, end).trimEnd()}…`;
}

import type { Page } from '@playwright/test';

const MARK = 'data-colours';
/** Elements of one pair of colours and one size of type that are looked at. */
const EACH = 4;

/**
 * Marks a few elements of each combination of text colour, what lies behind it, opacity and type:
 * what has the same of all these has the same contrast, and measuring each of thousands of table
 * cells takes most of the time that a page's rules take.
 *
 * @returns what selects them
 */
export async function markColours(page: Page): Promise<string> {
  await page.evaluate(
    ({ mark, each }) => {
      for (const old of document.querySelectorAll(`[${mark}]`)) old.removeAttribute(mark);
      const behind = new Map<Element, string>();
      const surroundings = (element: Element | null): string => {
        if (element === null) return '';
        const known = behind.get(element);
        if (known !== undefined) return known;
        const { backgroundColor, backgroundImage, opacity, position } = getComputedStyle(element);
        const isOpaque = /^rgb\(|, 1\)$/.test(backgroundColor) && opacity === '1';
        const own = `${backgroundColor} ${backgroundImage} ${opacity} ${position}`;
        const isPlain = isOpaque && backgroundImage === 'none' && position === 'static';
        const all = isPlain ? backgroundColor : `${own} on ${surroundings(element.parentElement)}`;
        behind.set(element, all);
        return all;
      };
      const counts = new Map<string, number>();
      for (const element of document.body.querySelectorAll('*')) {
        const hasText = [...element.childNodes].some(
          (node) => node.nodeType === Node.TEXT_NODE && node.textContent?.trim(),
        );
        const isField = element.matches('input, select, textarea, button');
        if (!hasText && !isField) continue;
        const { color, fill, fontSize, fontWeight, visibility } = getComputedStyle(element);
        const isSeen = element.getClientRects().length > 0;
        const type = [element.tagName, color, fill, fontSize, fontWeight, visibility, isSeen];
        const kind = `${type.join(' ')} ${surroundings(element)}`;
        const count = counts.get(kind) ?? 0;
        counts.set(kind, count + 1);
        if (count < each) element.setAttribute(mark, '');
      }
    },
    { mark: MARK, each: EACH },
  );
  return `[${MARK}]`;
}

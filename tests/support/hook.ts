import { act, createElement } from 'react';
import { createRoot } from 'react-dom/client';
import { vi } from 'vitest';

/** As much of a page as React asks for where nothing is drawn. */
function emptyPage(): Element {
  const node = { nodeType: 1, tagName: 'DIV', addEventListener: () => undefined };
  return { ...node, ownerDocument: { ...node, nodeType: 9 } } as unknown as Element;
}

function Screen({ draw }: { draw(): void }) {
  draw();
  return null;
}

/**
 * A hook as a screen uses it: `now` is what it gave last. What changes it stands within `act`. The
 * caller takes the stubs of globals back.
 */
export async function screenOf<Given>(useHook: () => Given): Promise<{ readonly now: Given }> {
  vi.stubGlobal('IS_REACT_ACT_ENVIRONMENT', true);
  vi.stubGlobal('window', { HTMLIFrameElement: class {} });
  const given: Given[] = [];
  const screen = createElement(Screen, { draw: () => void given.push(useHook()) });
  await act(async () => createRoot(emptyPage()).render(screen));
  return {
    get now() {
      return given[given.length - 1];
    },
  };
}

import { act } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { ApiProblem } from '@/components/hooks/api-problem';
import { useAction } from '@/components/hooks/use-action';
import { screenOf } from '@/tests/support/hook';

afterEach(() => vi.unstubAllGlobals());

const faults = [{ code: 'range', item: 'level', found: '2', expected: 'at most 1' }];
const refusal = () =>
  new ApiProblem({
    type: 'about:blank',
    title: 'The content was refused',
    status: 422,
    code: 'range',
    detail: 'It was refused.',
    errors: faults,
  });
const done = async () => undefined;
const refused = async () => {
  throw refusal();
};

/** Work that ends when it is told to. */
function open() {
  let end = (_reason?: Error) => {};
  const ended = new Promise<void>((resolve, reject) => {
    end = (reason) => (reason === undefined ? resolve() : reject(reason));
  });
  return { work: () => ended, end: (reason?: Error) => act(async () => end(reason)) };
}

describe('the state around one press', () => {
  it('is still before it', async () => {
    const action = await screenOf(useAction);
    expect(action.now).toMatchObject({ isBusy: false, problem: undefined, faults: [] });
  });

  it('answers that the work is done, and holds nothing of it', async () => {
    const action = await screenOf(useAction);
    const work = vi.fn(done);
    expect(await act(() => action.now.perform(work))).toBe(true);
    expect(work).toHaveBeenCalledTimes(1);
    expect(action.now).toMatchObject({ isBusy: false, problem: undefined, faults: [] });
  });

  it('keeps a refusal as a sentence with its places, and can be pressed again', async () => {
    const action = await screenOf(useAction);
    expect(await act(() => action.now.perform(refused))).toBe(false);
    expect(action.now).toMatchObject({
      isBusy: false,
      problem: 'level: found 2; expected at most 1',
      faults,
    });
  });

  it('keeps what breaks the work too, whatever it is and before anything was awaited', async () => {
    const action = await screenOf(useAction);
    const broken = () => {
      throw new RangeError('No status is chosen');
    };
    expect(await act(() => action.now.perform(broken))).toBe(false);
    expect(action.now).toMatchObject({ isBusy: false, problem: 'No status is chosen', faults: [] });
    expect(await act(() => action.now.perform(() => Promise.reject('no words')))).toBe(false);
    expect(action.now).toMatchObject({ isBusy: false, problem: 'no words', faults: [] });
  });

  it.each([{ reason: undefined }, { reason: refusal() }])(
    'is busy from the press until the work has ended: $reason',
    async ({ reason }) => {
      const action = await screenOf(useAction);
      const { work, end } = open();
      await act(async () => void action.now.perform(work));
      expect(action.now.isBusy).toBe(true);
      await end(reason);
      expect(action.now.isBusy).toBe(false);
    },
  );

  it('forgets a refusal with the next press, before that one has ended', async () => {
    const action = await screenOf(useAction);
    await act(() => action.now.perform(refused));
    const { work, end } = open();
    await act(async () => void action.now.perform(work));
    expect(action.now).toMatchObject({ isBusy: true, problem: undefined, faults: [] });
    await end(new Error('Not this time either'));
    expect(action.now).toMatchObject({ problem: 'Not this time either', faults: [] });
  });

  it('forgets a refusal when it is told to', async () => {
    const action = await screenOf(useAction);
    await act(() => action.now.perform(refused));
    await act(async () => action.now.clear());
    expect(action.now).toMatchObject({ isBusy: false, problem: undefined, faults: [] });
  });

  it('gives the same empty list as long as nothing is refused', async () => {
    const action = await screenOf(useAction);
    const { faults: first } = action.now;
    await act(() => action.now.perform(done));
    expect(action.now.faults).toBe(first);
  });
});

describe('a press that leaves', () => {
  const leaving = () => useAction({ leaves: true });

  it('stays busy once it is done: the page is on its way out', async () => {
    const action = await screenOf(leaving);
    expect(await act(() => action.now.perform(done))).toBe(true);
    expect(action.now).toMatchObject({ isBusy: true, problem: undefined });
  });

  it('can be pressed again where it was refused', async () => {
    const action = await screenOf(leaving);
    expect(await act(() => action.now.perform(refused))).toBe(false);
    expect(action.now).toMatchObject({ isBusy: false, faults });
  });
});

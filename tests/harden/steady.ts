import { Refused } from './api';
import { pause } from './work';
import { isAway } from './writers';

/** No outage of a row lasts so long; a step that does is what a person would give up on. */
const PATIENCE_MS = 240_000;

/** A person who meets an outage: looks whether it took effect, and does it again if not. */
export class Steady {
  outages = 0;
  /** Answers that nobody should get, outage or not. */
  readonly wrong: string[] = [];

  /** Asks until a part of the product that is away is back. */
  async ask<Answer>(work: () => Promise<Answer>): Promise<Answer> {
    const end = Date.now() + PATIENCE_MS;
    for (;;) {
      try {
        return await work();
      } catch (error) {
        this.bear(error, end);
        await pause(200);
      }
    }
  }

  /** @returns what `look` finds once it is there, be it written by this call or an earlier one */
  async settle<Found>(
    look: () => Promise<Found | null | undefined | false>,
    write: () => Promise<unknown>,
  ): Promise<Found> {
    const end = Date.now() + PATIENCE_MS;
    for (;;) {
      const there = await this.ask(look);
      if (there) return there;
      try {
        await write();
      } catch (error) {
        // "Taken" and the like: the next look tells what is there.
        const isTaken = error instanceof Refused && error.status === 409;
        if (isTaken && Date.now() < end) await pause(200);
        else this.bear(error, end);
      }
    }
  }

  private bear(error: unknown, end: number): void {
    if (Date.now() > end) throw error;
    if (isAway(error)) {
      this.outages++;
      return;
    }
    if (!(error instanceof Refused) || error.status < 500) throw error;
    this.wrong.push(error.message.slice(0, 300));
  }
}

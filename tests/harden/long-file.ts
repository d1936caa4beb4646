import { createRandom } from '@/lib/numerics/random';

const NOTE_CHARACTERS = 60_000;

/** A list of targets with long notes, a little over so many MiB; each number has its own text. */
export function longTargets(number: number, megabytes: number): Uint8Array<ArrayBuffer> {
  const { uniform } = createRandom(`upload ${number}`);
  const word = () => Math.floor(uniform() * 2 ** 48).toString(36);
  const paragraph = `${Array.from({ length: 1000 }, word).join(' ')} `;
  const note = paragraph.repeat(1 + NOTE_CHARACTERS / paragraph.length).slice(0, NOTE_CHARACTERS);
  const rows = Math.ceil((megabytes * 2 ** 20) / NOTE_CHARACTERS);
  const lines = Array.from({ length: rows }, (_, i) => `U${number} ${i},20,100,${note}`);
  return new TextEncoder().encode(`name,distance,age,notes\n${lines.join('\n')}\n`);
}

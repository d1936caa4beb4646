import { createHash } from 'node:crypto';
import { performance } from 'node:perf_hooks';
import { createRandom } from '@/lib/numerics/random';
import { Api } from '../api';
import { watchMemory } from '../memory';
import type { Bench, Measured, Row } from '../row';

const COUNT = 8;
const WEB_MB = 600;
const NOTE_CHARACTERS = 60_000;
const fileMb = () => Number(process.env.HARDEN_UPLOAD_MB ?? 50);

/** A list of targets with long notes, a little over so many MiB; each file has its own text. */
function targetsOf(number: number, megabytes: number): Uint8Array<ArrayBuffer> {
  const { uniform } = createRandom(`upload ${number}`);
  const word = () => Math.floor(uniform() * 2 ** 48).toString(36);
  const paragraph = `${Array.from({ length: 1000 }, word).join(' ')} `;
  const note = paragraph.repeat(1 + NOTE_CHARACTERS / paragraph.length).slice(0, NOTE_CHARACTERS);
  const rows = Math.ceil((megabytes * 2 ** 20) / NOTE_CHARACTERS);
  const lines = Array.from({ length: rows }, (_, i) => `U${number} ${i},20,100,${note}`);
  return new TextEncoder().encode(`name,distance,age,notes\n${lines.join('\n')}\n`);
}

const hashOf = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

async function measure({ product, say }: Bench): Promise<Measured> {
  const running = await product();
  const api = new Api(running);
  await api.post('surveys', { name: 'DUNLIN', band: 'H' });
  const files = Array.from({ length: COUNT }, (_, i) => targetsOf(i, fileMb()));
  const sent = files.map(hashOf);
  const watch = watchMemory(running.pidOf('web'));
  const start = performance.now();
  const answers = await Promise.all(
    files.map((file, i) => api.upload('targets', 'dunlin', `notes-${i}.csv`, file)),
  );
  const seconds = Number(((performance.now() - start) / 1000).toFixed(1));
  const webMb = watch.stop();
  say(`sent in ${seconds} s, web from ${watch.startMb} to ${webMb} MB at most`);
  let equal = 0;
  for (const [i, { id, sha256 }] of answers.entries()) {
    const back = new Uint8Array(await (await api.ask(`uploads/${id}/file`)).arrayBuffer());
    if (sha256 === sent[i] && hashOf(back) === sent[i]) equal++;
  }
  return {
    isMet: equal === COUNT && webMb < WEB_MB,
    figure:
      `${COUNT} files of ${fileMb()} MiB read and kept in ${seconds} s, ${equal} hashes equal; ` +
      `web at most ${webMb} MB, ${watch.startMb} MB before`,
    details: { count: COUNT, fileMb: fileMb(), seconds, equal, webMb, startMb: watch.startMb },
  };
}

export const row: Row = {
  name: 'large-uploads',
  what: 'L4: eight uploads of 50 MiB at once',
  goal: `hashes equal, sent, stated and sent back; web under ${WEB_MB} MB`,
  measure,
};

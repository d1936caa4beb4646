import { createHash } from 'node:crypto';
import { performance } from 'node:perf_hooks';
import { Api } from '../api';
import { longTargets } from '../long-file';
import { watchMemory } from '../memory';
import type { Bench, Measured, Row } from '../row';

const COUNT = 8;
const WEB_MB = 600;
const fileMb = () => Number(process.env.HARDEN_UPLOAD_MB ?? 50);

const hashOf = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

async function measure({ product, say }: Bench): Promise<Measured> {
  const running = await product();
  // First: while they are made, this process would not see that a resting connection is closed.
  const files = Array.from({ length: COUNT }, (_, i) => longTargets(i, fileMb()));
  const sent = files.map(hashOf);
  const api = new Api(running);
  await api.post('surveys', { name: 'DUNLIN', band: 'H' });
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

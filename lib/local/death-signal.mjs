import { existsSync } from 'node:fs';

const setpriv = '/usr/bin/setpriv';

/** The words of a command after which the kernel ends it when this process is killed. */
export function endWithLauncher(
  /** @type {string[]} */ words,
  /** @type {'TERM' | 'INT'} */ signal,
) {
  return existsSync(setpriv) ? [setpriv, '--pdeathsig', signal, '--', ...words] : words;
}

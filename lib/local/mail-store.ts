import { randomBytes } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import { readMail } from './mail-message';
import type { StoredMail } from './mail-page';

const idPattern = /^(\d{4}-\d\d-\d\dT\d\d-\d\d-\d\d-\d{3}Z)-[0-9a-f]{8}$/;

/** Messages as files in one folder, named for the time at which they came. */
export class MailStore {
  constructor(private readonly folder: string) {
    mkdirSync(folder, { recursive: true, mode: 0o700 });
  }

  /** Written under another name first, so that a reader never meets half a message. */
  add(raw: Buffer): string {
    const id = `${new Date().toISOString().replace(/[:.]/g, '-')}-${randomBytes(4).toString('hex')}`;
    const file = path.join(this.folder, `${id}.eml`);
    writeFileSync(`${file}.part`, raw, { mode: 0o600 });
    renameSync(`${file}.part`, file);
    return id;
  }

  find(id: string): StoredMail | null {
    const match = id.match(idPattern);
    const file = path.join(this.folder, `${id}.eml`);
    if (match === null || !existsSync(file)) return null;
    const receivedAt = match[1].replace(/T(\d\d)-(\d\d)-(\d\d)-\d{3}Z/, ' $1:$2:$3 UTC');
    return { ...readMail(readFileSync(file, 'latin1')), id, receivedAt };
  }

  /** Newest first. */
  list(limit = 200): StoredMail[] {
    return readdirSync(this.folder)
      .filter((name) => name.endsWith('.eml'))
      .sort()
      .reverse()
      .slice(0, limit)
      .flatMap((name) => this.find(name.slice(0, -4)) ?? []);
  }
}

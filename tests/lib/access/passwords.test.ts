import { describe, expect, it } from 'vitest';
import { checkPassword, hashPassword, isPassword, passwordFault } from '@/lib/access/passwords';
import type { InputError } from '@/lib/errors';

const owner = { name: 'Ruth Castellán', email: 'r.castellan@heron-observatory.example' };
const codeOf = (password: string) => passwordFault(password, owner)?.code ?? 'fine';

describe('passwordFault(password, owner)', () => {
  it('asks for 15 characters and takes 128', () => {
    expect(codeOf('Kq8moonlantern')).toBe('too-short');
    expect(codeOf('Kq8moonlanterns')).toBe('fine');
    const long =
      'violet anchor 7 mosaic pebble quarry tundra walnut zephyr bishop copper dahlia ember falcon garnet hollow island jasmine kettle';
    expect(long.length).toBe(127);
    expect(codeOf(long)).toBe('fine');
    expect(codeOf(`${long}8`)).toBe('fine');
    expect(codeOf(`${long}89`)).toBe('too-long');
  });

  it('counts characters as people do, after NFKC', () => {
    expect(codeOf('🌑🌒🌓🌔🌕🌖🌗')).toBe('too-short');
  });

  it.each([
    'passwordpassword',
    'qwertyuiopasdfghjkl',
    'abcdefghijklmnopqrst',
    'letmein letmein letmein',
    '123456789012345678',
    'aaaaaaaaaaaaaaaaaaaa',
  ])('refuses %s, which is made of repeats, runs or listed words', (password) => {
    expect(codeOf(password)).toBe('password-guessable');
  });

  it.each([
    'my rarebound lantern 42',
    'Rare-Bound lantern 42 x',
    'castellan lantern seven',
    'Castellán lantern seven',
    'ruth castellan lantern 8',
    'heron-observatory lantern 5',
    'R A R E B O U N D lantern',
  ])('refuses "%s", which holds a name', (password) => {
    expect(codeOf(password)).toBe('password-name');
  });

  it('asks for no classes of characters', () => {
    expect(codeOf('violet harbour anchor mosaic')).toBe('fine');
  });
});

describe('passwordFault(password, owner, beside a second factor)', () => {
  const beside = (password: string) => passwordFault(password, owner, true)?.code ?? 'fine';

  it('asks for 8 characters that are no listed words, and for no name', () => {
    expect(beside('Kq8-mo3')).toBe('too-short');
    expect(beside('Kq8-mo3z')).toBe('fine');
    expect(beside('password1')).toBe('password-guessable');
    expect(beside('qwertyui')).toBe('password-guessable');
    expect(beside('Ruth Castellan 8')).toBe('password-name');
  });
});

describe('checkPassword(password, owner)', () => {
  it('names the field', () => {
    try {
      checkPassword('short', owner);
      expect.unreachable();
    } catch (error) {
      expect((error as InputError).faults[0]).toMatchObject({
        code: 'too-short',
        item: 'password',
      });
      expect((error as InputError).message).toBe(
        'password: found 5 characters; expected at least 15',
      );
    }
  });
});

describe('hashPassword(password)', () => {
  it('uses argon2id with 19 MiB, two passes and one lane, and a new salt each time', async () => {
    const first = await hashPassword('violet harbour anchor');
    expect(first).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(await hashPassword('violet harbour anchor')).not.toBe(first);
  });

  it('hashes the whole password: nothing is cut at 72 bytes', async () => {
    const start = 'x'.repeat(100);
    const stored = await hashPassword(`${start}a`);
    expect(await isPassword(`${start}a`, stored)).toBe(true);
    expect(await isPassword(`${start}b`, stored)).toBe(false);
  });

  it('takes the same characters from another keyboard', async () => {
    const stored = await hashPassword('ＦＵＬＬ width ﬁnch');
    expect(await isPassword('FULL width finch', stored)).toBe(true);
  });

  it('knows nobody without a stored hash', async () => {
    expect(await isPassword('nobody signs in with this one', null)).toBe(false);
  });
});

import { Secret, TOTP } from 'otpauth';

/** What every authenticator program understands; others are not understood by all. */
const RULES = { algorithm: 'SHA1', digits: 6, period: 30 };
/** 160 bits, as long as the hash. @source RFC 4226, section 4, R6 */
const KEY_BYTES = 20;
/** One step early or late: a clock that is off by half a minute. @source RFC 6238, section 5.2 */
const WINDOW_STEPS = 1;

/** A new key as text in base 32. */
export const newKey = (): string => new Secret({ size: KEY_BYTES }).base32;

/** The key as the address that authenticator programs take. */
export const addressOfKey = (key: string, email: string): string =>
  new TOTP({ ...RULES, issuer: 'Rarebound', label: email, secret: key }).toString();

/**
 * The time step for which a code was made, within one step of the moment; null for a wrong code.
 *
 * @param momentMs milliseconds since 1970
 * @source RFC 6238, section 4.2
 */
export function stepOfCode(key: string, code: string, momentMs = Date.now()): number | null {
  const token = code.replace(/\s+/g, '');
  if (!/^\d{6}$/.test(token)) return null;
  const secret = Secret.fromBase32(key);
  const off = TOTP.validate({
    ...RULES,
    token,
    secret,
    timestamp: momentMs,
    window: WINDOW_STEPS,
  });
  return off === null ? null : TOTP.counter({ period: RULES.period, timestamp: momentMs }) + off;
}

import { sealFor, signFor, unsealFor } from '@/lib/access/sealed';

/** Bytes that only a holder of the server's secret can read: a copy of the database opens no link. */
export const seal = (value: unknown): Buffer => sealFor('outbox', value);

/** @throws Error when the bytes were sealed with another secret, or were changed */
export const unseal = (bytes: Buffer): unknown => unsealFor('outbox', bytes);

/** 256 bits that nobody without the server's secret can write under a text. */
export const signatureOf = (text: string): string => signFor('stop link', text);

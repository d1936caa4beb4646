'use client';

import dynamic from 'next/dynamic';

/** Notes stand at the foot of a page: drawn by the server, made live after the rest. */
export const NotesBelow = dynamic(async () => (await import('./notes-panel')).NotesPanel);

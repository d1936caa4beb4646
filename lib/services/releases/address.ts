import { config } from '@/lib/config';

/** Where everybody reads a release, or a guest what a link opens. */
export const addressOfRelease = (code: string) =>
  `${new URL(config().webAddress).origin}/r/${code}`;

import { Fragment } from 'react';

/** An address that breaks only before its slashes, so that no word of it is torn. */
export function ApiPath({ path }: { path: string }) {
  return path
    .split('/')
    .slice(1)
    .map((part, at) => (
      // biome-ignore lint/suspicious/noArrayIndexKey: the parts of an address have their place as name
      <Fragment key={at}>
        <wbr />/{part}
      </Fragment>
    ));
}

'use client';

import FrameworkLink from 'next/link';
import { type ComponentProps, useState } from 'react';

type LinkProps = Omit<
  ComponentProps<typeof FrameworkLink>,
  'prefetch' | 'onPointerEnter' | 'onFocus'
>;

/**
 * A link whose page is fetched ahead once a hand or the focus comes to it.
 *
 * By itself the framework fetches every page ahead whose link is in sight, two dozen a screen, while
 * the screen itself still becomes alive.
 */
export function Link(props: LinkProps) {
  const [isNear, setNear] = useState(false);
  const come = () => setNear(true);
  return (
    <FrameworkLink
      {...props}
      prefetch={isNear ? null : false}
      onPointerEnter={come}
      onFocus={come}
    />
  );
}

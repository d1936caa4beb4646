'use client';

import { useEffect, useRef, useState } from 'react';
import type { ZodType } from 'zod';

/** Why a form cannot be sent in the moment before its schema is there. */
export const CHECKS_COME = 'The checks of this form are being loaded.';

/**
 * The schema that a form is checked by at each change, loaded once the form stands on the screen;
 * undefined until then.
 */
export function useSchema<Out>(load: () => Promise<ZodType<Out>>): ZodType<Out> | undefined {
  const [schema, setSchema] = useState<ZodType<Out>>();
  const loader = useRef(load);
  useEffect(() => {
    let isHere = true;
    void loader.current().then((loaded) => {
      if (isHere) setSchema(loaded);
    });
    return () => {
      isHere = false;
    };
  }, []);
  return schema;
}

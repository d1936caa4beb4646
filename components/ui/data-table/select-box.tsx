'use client';

import { useEffect, useRef } from 'react';
import { Cell, HeadCell } from '../table';

const boxLook = 'size-[18px] accent-(--ink)';
const frameLook = 'flex size-6 items-center justify-center max-md:size-11';

interface SelectBoxProps {
  label: string;
  isChecked: boolean;
  isDisabled: boolean;
  /** Takes the click with its Shift key, which extends from the last box. */
  onToggle(event: unknown): void;
}

export function SelectBox({ label, isChecked, isDisabled, onToggle }: SelectBoxProps) {
  return (
    <Cell className="w-8" onClick={(event) => event.stopPropagation()}>
      <label className={frameLook}>
        <input
          type="checkbox"
          className={boxLook}
          checked={isChecked}
          disabled={isDisabled}
          onChange={onToggle}
        />
        <span className="sr-only">{label}</span>
      </label>
    </Cell>
  );
}

interface SelectHeadProps {
  table: {
    getIsAllRowsSelected(): boolean;
    getIsSomeRowsSelected(): boolean;
    toggleAllRowsSelected(value?: boolean): void;
  };
  many: string;
}

/** All of the shown rows at once. */
export function SelectHead({ table, many }: SelectHeadProps) {
  const box = useRef<HTMLInputElement>(null);
  const isAll = table.getIsAllRowsSelected();
  const isSome = table.getIsSomeRowsSelected() && !isAll;
  useEffect(() => {
    if (box.current) box.current.indeterminate = isSome;
  }, [isSome]);
  return (
    <HeadCell className="w-8">
      <label className={frameLook}>
        <input
          ref={box}
          type="checkbox"
          className={boxLook}
          checked={isAll}
          onChange={() => table.toggleAllRowsSelected(!isAll)}
        />
        <span className="sr-only">Select all shown {many}</span>
      </label>
    </HeadCell>
  );
}

'use client';

import { useEffect, useRef } from 'react';
import { Cell, HeadCell } from '../table';

const frameLook = 'flex size-6 items-center justify-center max-md:size-11';

interface SelectBoxProps {
  label: string;
  isChecked: boolean;
  isDisabled: boolean;
  /** With the Shift key the press reaches from the last box to this one. */
  onToggle(isRange: boolean): void;
}

export function SelectBox({ label, isChecked, isDisabled, onToggle }: SelectBoxProps) {
  return (
    <Cell className="w-8" onClick={(event) => event.stopPropagation()}>
      <label className={frameLook}>
        <input
          type="checkbox"
          className="checkbox"
          checked={isChecked}
          disabled={isDisabled}
          onChange={({ nativeEvent }) => onToggle((nativeEvent as MouseEvent).shiftKey === true)}
        />
        <span className="sr-only">{label}</span>
      </label>
    </Cell>
  );
}

interface SelectHeadProps {
  isAllSelected: boolean;
  isSomeSelected: boolean;
  toggleAll(isSelected: boolean): void;
  many: string;
}

/** All of the shown rows at once. */
export function SelectHead({ isAllSelected, isSomeSelected, toggleAll, many }: SelectHeadProps) {
  const box = useRef<HTMLInputElement>(null);
  useEffect(() => {
    if (box.current) box.current.indeterminate = isSomeSelected;
  }, [isSomeSelected]);
  return (
    <HeadCell className="w-8">
      <label className={frameLook}>
        <input
          ref={box}
          type="checkbox"
          className="checkbox"
          checked={isAllSelected}
          onChange={() => toggleAll(!isAllSelected)}
        />
        <span className="sr-only">Select all shown {many}</span>
      </label>
    </HeadCell>
  );
}

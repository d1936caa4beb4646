'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Icon } from '@/components/ui/icon';
import { SelectField } from '@/components/ui/select-field';
import {
  compareAddress,
  mostSides,
  readSides,
  type SideAddress,
  sideLetters,
  writeSide,
} from './address';

export interface RunChoice {
  /** As the address writes it: "A-31.2". */
  value: string;
  label: string;
}

interface PickListProps {
  collaboration: string;
  /** Finished runs, newest of each analysis first. */
  choices: RunChoice[];
  chosen: { address: SideAddress; name: string }[];
}

/** Which runs are compared: each can be taken out, moved to the front, and another added. */
export function PickList({ collaboration, choices, chosen }: PickListProps) {
  const router = useRouter();
  const [isBusy, setBusy] = useState(false);
  const go = (sides: SideAddress[]) => {
    setBusy(true);
    router.push(compareAddress(collaboration, sides));
  };
  const addresses = chosen.map(({ address }) => address);
  const taken = new Set(addresses.map(writeSide));
  const free = choices.filter(({ value }) => !taken.has(value));
  return (
    <div className="mb-4 flex flex-wrap items-end gap-x-5 gap-y-3" aria-busy={isBusy}>
      <ol className="flex flex-wrap gap-2" aria-label="Compared runs">
        {chosen.map(({ address, name }, index) => (
          <li
            key={writeSide(address)}
            className="flex min-h-9 items-center gap-2 rounded border border-rule pl-2.5 text-note"
          >
            <b>{sideLetters[index]}</b>
            {index === 0 ? (
              name
            ) : (
              <button
                type="button"
                className="text-act"
                title="Make it A: the others are held against it"
                onClick={() => go([address, ...addresses.filter((one) => one !== address)])}
              >
                {name}
              </button>
            )}
            <button
              type="button"
              aria-label={`Take ${name} out`}
              className="grid size-9 place-items-center max-lg:size-11"
              onClick={() => go(addresses.filter((one) => one !== address))}
            >
              <Icon name="close" size={15} />
            </button>
          </li>
        ))}
      </ol>
      {addresses.length < mostSides && free.length > 0 && (
        <div className="w-72 max-w-full">
          <SelectField
            label={addresses.length === 0 ? 'First run' : 'Add a run'}
            value=""
            onChange={(event) => go([...addresses, ...readSides(event.target.value)])}
            options={[{ value: '', label: 'choose a finished run' }, ...free]}
          />
        </div>
      )}
    </div>
  );
}

'use client';

import { useState } from 'react';
import { type Accept, useDropzone } from 'react-dropzone';
import { Icon } from './icon';

interface FileDropProps {
  /** "Drop target and curve files here". */
  label: string;
  hint?: string;
  onFiles(files: File[]): void;
  accept?: Accept;
  isMultiple?: boolean;
  maxBytes?: number;
  /** Why files cannot be taken now. */
  disabledReason?: string;
}

export function FileDrop({
  label,
  hint,
  onFiles,
  accept,
  isMultiple = true,
  maxBytes,
  disabledReason,
}: FileDropProps) {
  const [refused, setRefused] = useState<string[]>([]);
  const { getRootProps, getInputProps, isDragActive, open } = useDropzone({
    accept,
    multiple: isMultiple,
    maxSize: maxBytes,
    disabled: disabledReason !== undefined,
    noClick: true,
    noKeyboard: true,
    onDrop: (accepted, rejections) => {
      setRefused(rejections.map(({ file, errors }) => `${file.name}: ${reason(errors[0]?.code)}`));
      if (accepted.length > 0) onFiles(accepted);
    },
  });
  return (
    <div>
      <div
        {...getRootProps()}
        className={`rounded border border-dashed px-5 py-6 ${isDragActive ? 'border-act bg-act-soft' : 'border-rule2 bg-surface'}`}
      >
        <input {...getInputProps()} aria-label={label} />
        <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-3">
          <div>
            <b className="block">{isDragActive ? 'Let go to add them' : label}</b>
            <span className="text-ink3 text-note">{disabledReason ?? hint}</span>
          </div>
          <button
            type="button"
            className={`inline-flex h-9 items-center gap-[7px] rounded border border-rule2 px-3.5 font-semibold max-md:h-11 ${disabledReason === undefined ? 'bg-surface' : 'border-dashed text-ink3'}`}
            aria-disabled={disabledReason !== undefined || undefined}
            onClick={open}
          >
            <Icon name="document" />
            Choose {isMultiple ? 'files' : 'a file'}
          </button>
        </div>
      </div>
      {refused.length > 0 && (
        <ul className="mt-2 text-bad text-note" role="alert">
          {refused.map((line) => (
            <li key={line} className="flex gap-1.5">
              <Icon name="bad" size={15} className="mt-0.5" />
              {line}
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}

function reason(code: string | undefined): string {
  if (code === 'file-too-large') return 'larger than a file may be';
  if (code === 'too-many-files') return 'one file at a time';
  return 'not one of the kinds that can be read';
}

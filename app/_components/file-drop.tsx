'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import { DropZone, FileTrigger, isFileDropItem, Text } from 'react-aria-components';
import { Button } from './button';

export interface FileDropProps {
  /** What is wanted, such as `Drop the mesh here`. */
  label: ReactNode;
  /** File name endings, such as `.stl`; the picker offers these, and the server still decides. */
  accept: readonly string[];
  onFiles: (files: File[]) => void;
  multiple?: boolean;
  help?: ReactNode;
  error?: ReactNode;
  disabled?: boolean;
  buttonText?: string;
}

/** A place to drop a file, with a button that opens the picker for everyone who does not drag. */
export function FileDrop(props: FileDropProps) {
  const { label, accept, onFiles, multiple, help, error, disabled, buttonText = 'Choose a file' } = props;
  return (
    <div className="flex flex-col gap-1.5">
      <DropZone
        isDisabled={disabled}
        onDrop={async (event) => {
          const dropped = await Promise.all(event.items.filter(isFileDropItem).map((item) => item.getFile()));
          if (dropped.length > 0) onFiles(multiple ? dropped : dropped.slice(0, 1));
        }}
        className={clsx(
          'flex flex-col items-start gap-3 border border-dashed px-6 py-7 data-drop-target:border-verdigris data-drop-target:bg-verdigris-wash',
          error ? 'border-madder' : 'border-edge',
        )}
      >
        <Text slot="label" className="text-md font-semibold">
          {label}
        </Text>
        {help ? <p className="max-w-prose text-sm text-slate">{help}</p> : null}
        <FileTrigger
          acceptedFileTypes={[...accept]}
          allowsMultiple={multiple}
          onSelect={(list) => {
            if (list && list.length > 0) onFiles(Array.from(list));
          }}
        >
          <Button isDisabled={disabled}>{buttonText}</Button>
        </FileTrigger>
      </DropZone>
      {error ? (
        <p role="alert" className="flex gap-1.5 text-sm font-medium text-madder">
          <span aria-hidden>▲</span>
          <span>{error}</span>
        </p>
      ) : null}
    </div>
  );
}

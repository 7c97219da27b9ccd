'use client';

import { useState } from 'react';
import { FileTrigger } from 'react-aria-components';
import { Button } from '@/app/_components/button';
import { Digest } from '@/app/_components/digest';
import { ErrorState } from '@/app/_components/error-state';
import { FileDrop } from '@/app/_components/file-drop';
import { formatBytes } from '@/app/_components/format-figure';
import { Length } from '@/app/_components/length';
import { ProgressBar } from '@/app/_components/progress-bar';
import { Select } from '@/app/_components/select';
import { asSentence } from '@/app/_components/sentence-case';
import type { useUpload } from '../_hooks/use-upload';

type Props = ReturnType<typeof useUpload> & { unit: string; onUnit: (unit: string) => void };

const accept = ['.stl', '.3mf', '.step', '.stp'];
const units = [
  { value: 'mm', label: 'millimetres' },
  { value: 'cm', label: 'centimetres' },
  { value: 'm', label: 'metres' },
  { value: 'in', label: 'inches' },
  { value: 'ft', label: 'feet' },
  { value: 'micron', label: 'microns' },
];

const formats = {
  'stl-binary': 'binary STL',
  'stl-ascii': 'ASCII STL',
  '3mf': '3MF',
  step: 'STEP, cut into triangles',
};

/** The mesh of the draft: picked, sent, read by the worker; refused with what is wrong and what to do. */
export function FilePanel({ sending, begin, resume, pause, cancel, readIn, unit, onUnit }: Props) {
  const [wrongName, setWrongName] = useState<string | null>(null);
  const { upload, phase } = sending;

  function pick(file: File) {
    if (!accept.some((ending) => file.name.toLowerCase().endsWith(ending))) {
      setWrongName(
        `${file.name} is not an STL, 3MF or STEP file. Export the template as one of these and pick that.`,
      );
      return;
    }
    if (file.size === 0) {
      setWrongName(`${file.name} is empty. Export it again.`);
      return;
    }
    setWrongName(null);
    if (phase === 'paused') resume(file);
    else void begin(file, unit);
  }

  if (phase === 'idle' || phase === 'starting')
    return (
      <div className="flex flex-col gap-4">
        <Select
          label="Unit of the file"
          help="For STL, which carries no unit: the check run warns when another one is likelier. 3MF and STEP files bring their own."
          options={units}
          value={unit}
          onChange={onUnit}
          disabled={phase === 'starting'}
        />
        <FileDrop
          label="Drop the template’s mesh here"
          accept={accept}
          onFiles={([file]) => pick(file)}
          help="STL or 3MF up to 500 MB, STEP up to 100 MB. It stands on the bed with its base at z = 0; parts are pulled off upwards."
          error={wrongName ?? sending.trouble}
          disabled={phase === 'starting'}
        />
      </div>
    );
  if (!upload) return null;

  return (
    <div className="border border-ink bg-sheet">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1 border-b border-rule px-4 py-3">
        <span className="min-w-0 font-semibold break-all">{upload.fileName}</span>
        <span className="font-mono text-sm text-slate">{formatBytes(upload.bytes)}</span>
      </div>
      <div className="flex flex-col gap-3 px-4 py-3">
        {phase === 'sending' || phase === 'paused' ? (
          <>
            <ProgressBar
              label={phase === 'sending' ? 'Sending to the store' : 'Sending is paused'}
              value={sending.progress}
              detail={`${formatBytes(sending.progress * upload.bytes)} of ${formatBytes(upload.bytes)}`}
            />
            {sending.needsFile ? (
              <FileDrop
                label={pickAgain(upload)}
                accept={accept}
                onFiles={([file]) => pick(file)}
                help="Choose the same file, unchanged; the browser does not keep it over a reload."
                error={wrongName}
              />
            ) : null}
          </>
        ) : null}
        {phase === 'reading' ? (
          <ProgressBar label="Reading the file: hash, soundness, size" value={null} />
        ) : null}
        {phase === 'ready' && upload.mesh ? <MeshFacts mesh={upload.mesh} /> : null}
        {takesUnit(upload) ? (
          <Select
            label="Unit of the file"
            help="Another one has the file read again; it is not sent again."
            options={units}
            value={upload.unit}
            onChange={(next) => {
              onUnit(next);
              void readIn(next);
            }}
            disabled={phase === 'reading'}
          />
        ) : null}
        {phase === 'refused' && upload.refusal ? (
          <ErrorState title="This file cannot be used" level={3}>
            <p>{asSentence(upload.refusal.message, upload.fileName)}</p>
            <Reasons message={upload.refusal.message} reasons={upload.refusal.reasons} />
            <p className="mt-2">Your draft is kept. Mend the file and pick it again.</p>
          </ErrorState>
        ) : null}
        {sending.trouble || (wrongName && !sending.needsFile) ? (
          <p role="alert" className="text-sm font-medium text-madder">
            {sending.trouble ?? wrongName}
          </p>
        ) : null}
        <div className="flex flex-wrap gap-2">
          {phase === 'sending' ? <Button onPress={pause}>Pause</Button> : null}
          {phase === 'paused' && !sending.needsFile ? <Button onPress={() => resume()}>Resume</Button> : null}
          {phase === 'ready' || phase === 'refused' ? (
            <FileTrigger
              acceptedFileTypes={accept}
              onSelect={(list) => {
                if (list?.[0]) pick(list[0]);
              }}
            >
              <Button variant="plain">Choose another file</Button>
            </FileTrigger>
          ) : (
            <Button variant="plain" onPress={() => void cancel()}>
              Cancel
            </Button>
          )}
        </div>
      </div>
    </div>
  );
}

type Upload = NonNullable<Props['sending']['upload']>;

/** What is kept of a file that was broken off, and what to do. Only whole parts are kept. */
function pickAgain({ fileName, partsDone, partCount }: Upload): string {
  if (partsDone.length === 0) return `No part of ${fileName} had arrived whole: pick it again to send it`;
  return `${partsDone.length} of ${partCount} parts kept: pick ${fileName} again to send the others`;
}

/** True for a file that carries no unit of its own and was read, or was refused for its size in the unit given. */
function takesUnit({ state, mesh, refusal, fileName }: Upload): boolean {
  if (state === 'ready') return mesh?.format === 'stl-binary' || mesh?.format === 'stl-ascii';
  if (state === 'refused') return refusal?.code === 'out_of_range';
  return state === 'reading' && fileName.toLowerCase().endsWith('.stl');
}

/** What the engine adds to its sentence; what the sentence says already is not said again. */
function Reasons({ message, reasons }: { message: string; reasons: readonly string[] }) {
  const more = reasons.filter((reason) => !message.toLowerCase().includes(reason.toLowerCase()));
  if (more.length === 0) return null;
  return (
    <ul className="mt-2 list-disc pl-5">
      {more.map((reason) => (
        <li key={reason}>{asSentence(reason)}</li>
      ))}
    </ul>
  );
}

function MeshFacts({ mesh }: { mesh: NonNullable<NonNullable<Props['sending']['upload']>['mesh']> }) {
  const size = mesh.boundsMm.max.map((max, axis) => max - mesh.boundsMm.min[axis]);
  return (
    <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 text-sm">
      <dt className="text-slate">Size</dt>
      <dd className="flex flex-wrap gap-x-1.5">
        {size.map((mm, axis) => (
          <span key={axis}>
            {axis > 0 ? '× ' : ''}
            <Length mm={mm} digits={1} />
          </span>
        ))}
      </dd>
      <dt className="text-slate">Read as</dt>
      <dd>
        {formats[mesh.format]}, in {units.find(({ value }) => value === mesh.unit)?.label ?? mesh.unit}
      </dd>
      <dt className="text-slate">Triangles</dt>
      <dd className="font-mono">{mesh.triangles.toLocaleString('en-GB')}</dd>
      <dt className="text-slate">SHA-256</dt>
      <dd>
        <Digest value={mesh.sha256} />
      </dd>
    </dl>
  );
}

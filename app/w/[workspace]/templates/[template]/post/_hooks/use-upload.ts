'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { api, ApiError, explainError } from '@/app/_components/api-client';
import type { PresignedParts, UploadView as UploadViewSchema } from '@/lib/review/schemas';
import type { z } from 'zod';
import { isSameFile } from './is-same-file';
import { sendPart } from './send-part';

type UploadView = z.infer<typeof UploadViewSchema>;
type Part = z.infer<typeof PresignedParts>['parts'][number];

export type Sending = {
  upload: UploadView | null;
  /** Share of the bytes that the store has, 0 to 1. */
  progress: number;
  phase: 'idle' | 'starting' | 'sending' | 'paused' | 'reading' | 'ready' | 'refused';
  /** What went wrong on the way; sending can be taken up again. */
  trouble: string | null;
  /** True when the file must be picked again before sending can go on (after a reload). */
  needsFile: boolean;
};

/** Parts under way at the same time: few, so that on a slow line each is whole, and kept, soon. */
const atOnce = 2;
const triesPerPart = 5;

function phaseOf(upload: UploadView | null, running: boolean): Sending['phase'] {
  if (!upload || upload.state === 'cancelled') return 'idle';
  if (upload.state === 'sending') return running ? 'sending' : 'paused';
  return upload.state;
}

/**
 * Sends a file straight to the store, part by part: pause, resume, cancel, and take up again after a
 * reload or a lost connection. The application's server sees numbers and ETags only.
 */
export function useUpload(
  workspacePath: string,
  templateId: string,
  initial: UploadView | null,
  onChange: (upload: UploadView | null) => void,
) {
  const [upload, setUpload] = useState<UploadView | null>(initial);
  const [running, setRunning] = useState(false);
  const [starting, setStarting] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [sentBytes, setSentBytes] = useState(0);
  const file = useRef<File | null>(null);
  const [holdsFile, setHoldsFile] = useState(false);
  const hold = useCallback((next: File | null) => {
    file.current = next;
    setHoldsFile(next !== null);
  }, []);
  const stop = useRef<AbortController | null>(null);

  const take = useCallback(
    (next: UploadView | null) => {
      setUpload(next);
      onChange(next);
    },
    [onChange],
  );

  const run = useCallback(
    async (current: UploadView) => {
      const controller = new AbortController();
      stop.current = controller;
      setRunning(true);
      setTrouble(null);
      const base = `${workspacePath}/uploads/${current.id}`;
      const done = new Set(current.partsDone);
      const inFlight = new Map<number, number>();
      const report = () => {
        const whole = [...done].reduce((sum, number) => sum + bytesOf(current, number), 0);
        setSentBytes(whole + [...inFlight.values()].reduce((sum, bytes) => sum + bytes, 0));
      };
      report();
      const missing = Array.from({ length: current.partCount }, (_, i) => i + 1).filter((n) => !done.has(n));
      const sendOne = async (number: number) => {
        const { parts } = await api<{ parts: Part[] }>(`${base}/parts`, {
          body: { parts: [number] },
          signal: controller.signal,
        });
        const from = (number - 1) * current.partBytes;
        const etag = await sendPart(parts[0].url, file.current!.slice(from, from + parts[0].bytes), {
          signal: controller.signal,
          tries: triesPerPart,
          onProgress: (bytes) => {
            inFlight.set(number, bytes);
            report();
          },
        });
        await api<UploadView>(`${base}/parts/done`, { body: { number, etag } });
        inFlight.delete(number);
        done.add(number);
        report();
        // At once, so that a pause in the middle of the others does not send this one again.
        setUpload((old) =>
          old?.id === current.id && old.state === 'sending'
            ? { ...old, partsDone: [...done].sort((a, b) => a - b) }
            : old,
        );
      };
      const lane = async () => {
        for (let number = missing.shift(); number !== undefined; number = missing.shift())
          await sendOne(number);
      };
      try {
        await Promise.all(Array.from({ length: atOnce }, lane));
        take(await api<UploadView>(`${base}/complete`, { method: 'POST', body: {} }));
      } catch (error) {
        if (!controller.signal.aborted) setTrouble(explainError(error).detail);
        // The other lane stops too; what it had half sent is not kept, so it is not shown as sent.
        controller.abort();
        setSentBytes(0);
        // The server has forgotten the parts: Resume sends them all.
        if (error instanceof ApiError && error.reason === 'parts-missing')
          await api<UploadView>(base).then(take, () => undefined);
      } finally {
        if (stop.current === controller) stop.current = null;
        setRunning(false);
      }
    },
    [take, workspacePath],
  );

  const begin = useCallback(
    async (picked: File, unit: string) => {
      hold(picked);
      setStarting(true);
      setTrouble(null);
      try {
        const made = await api<UploadView>(`${workspacePath}/templates/${templateId}/uploads`, {
          body: { fileName: picked.name, bytes: picked.size, lastModified: picked.lastModified, unit },
        });
        take(made);
        void run(made);
      } catch (error) {
        setTrouble(explainError(error).detail);
      } finally {
        setStarting(false);
      }
    },
    [hold, run, take, templateId, workspacePath],
  );

  /** Goes on with an upload that a reload or a lost connection broke off; the same file must be picked. */
  const resume = useCallback(
    (picked?: File) => {
      if (!upload) return;
      const source = picked ?? file.current;
      if (!source) return;
      if (!isSameFile(source, upload)) {
        setTrouble(
          `That is another file, or it was changed since. Pick ${upload.fileName} as it was to go on, or cancel and start anew.`,
        );
        return;
      }
      hold(source);
      void run(upload);
    },
    [hold, run, upload],
  );

  const pause = useCallback(() => stop.current?.abort(), []);

  const cancel = useCallback(async () => {
    stop.current?.abort();
    if (upload && (upload.state === 'sending' || upload.state === 'reading')) {
      try {
        await api(`${workspacePath}/uploads/${upload.id}/cancel`, { method: 'POST', body: {} });
      } catch (error) {
        // A colleague's file stays theirs; this draft just no longer names it.
        if (!(error instanceof ApiError && error.reason === 'not-your-upload')) {
          setTrouble(explainError(error).detail);
          return;
        }
      }
    }
    hold(null);
    setSentBytes(0);
    setTrouble(null);
    take(null);
  }, [hold, take, upload, workspacePath]);

  /** Has the file that is in the store read again in another unit. */
  const readIn = useCallback(
    async (unit: string) => {
      if (!upload) return;
      setTrouble(null);
      try {
        take(
          await api<UploadView>(`${workspacePath}/uploads/${upload.id}/unit`, {
            method: 'POST',
            body: { unit },
          }),
        );
      } catch (error) {
        setTrouble(explainError(error).detail);
      }
    },
    [take, upload, workspacePath],
  );

  useReading(workspacePath, upload, take);
  useEffect(() => () => stop.current?.abort(), []);

  const phase = starting ? 'starting' : phaseOf(upload, running);
  const storedBytes = upload?.partsDone.reduce((sum, n) => sum + bytesOf(upload, n), 0) ?? 0;
  const sending: Sending = {
    upload,
    progress: upload ? Math.min(1, Math.max(sentBytes, storedBytes) / upload.bytes) : 0,
    phase,
    trouble,
    needsFile: phase === 'paused' && !holdsFile,
  };
  return { sending, begin, resume, pause, cancel, readIn };
}

const bytesOf = (upload: UploadView, number: number) =>
  Math.min(upload.partBytes, upload.bytes - (number - 1) * upload.partBytes);

/** While the worker reads the file, asks how far it is; the live event only makes this sooner. */
function useReading(
  workspacePath: string,
  upload: UploadView | null,
  take: (next: UploadView) => void,
): void {
  const reading = upload?.state === 'reading' ? upload.id : null;
  useEffect(() => {
    if (!reading) return;
    let alive = true;
    const timer = setInterval(async () => {
      try {
        const next = await api<UploadView>(`${workspacePath}/uploads/${reading}`);
        if (alive && next.state !== 'reading') take(next);
      } catch {
        // The next tick asks again; a lost connection is shown by the live state in the frame.
      }
    }, 1000);
    return () => {
      alive = false;
      clearInterval(timer);
    };
  }, [reading, take, workspacePath]);
}

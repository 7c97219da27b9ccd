import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import type { Readable } from 'node:stream';
import { EXIT } from './exit-codes.mjs';

export interface ConverterLimits {
  wallMs: number;
  memoryMb: number;
  /** Of that, what JavaScript's own heap may have. */
  heapMb: number;
  bodies: number;
  triangles: number;
  sizeShare: number;
  finestMm: number;
  coarsestMm: number;
  angularDeg: number;
}

export type Converted =
  | { ok: true; triangles: number; bodies: number; deflectionMm: number; coords: Float32Array }
  | { ok: false; failed: string; why?: string; bodies?: number; triangles?: number };

/** Bytes that the process's answer may have before its coordinates. */
const MOST_HEAD = 4096;
/** The process ends itself at its limit; this is for one that cannot any more. */
const GRACE_MS = 5_000;

/**
 * Runs one conversion in a process of its own: none of this one's environment, no shell, its memory and time bounded from inside
 * and its time from here as well. It is gone when the promise settles; it also ends by itself when this thread does.
 * The only place of the engine that starts a process.
 */
export function runConverter(
  bytes: Uint8Array,
  limits: ConverterLimits,
  signal?: AbortSignal,
): Promise<Converted> {
  if (signal?.aborted) return Promise.resolve({ ok: false, failed: 'stopped' });
  const file = path.join(import.meta.dirname, 'step-process.mjs');
  const child: ChildProcess = spawn(
    process.execPath,
    [`--max-old-space-size=${limits.heapMb}`, file, String(bytes.length), JSON.stringify(limits)],
    { env: { NODE_ENV: 'production' }, stdio: ['pipe', 'ignore', 'ignore', 'pipe'], windowsHide: true },
  );
  return new Promise((resolve) => {
    const answer = new Answer(limits.triangles);
    let why: string | null = null;
    const end = (reason: string) => {
      why ??= reason;
      child.kill('SIGKILL');
    };
    const onAbort = () => end('stopped');
    const timer = setTimeout(() => end('too-slow'), limits.wallMs + GRACE_MS);
    signal?.addEventListener('abort', onAbort, { once: true });
    child.once('error', (error) => {
      why ??= 'crashed';
      settle({ ok: false, failed: why, why: error.message });
    });
    const out = child.stdio[3] as Readable;
    out.on('data', (chunk: Buffer) => {
      if (!answer.take(chunk)) end('crashed');
    });
    out.on('error', () => undefined);
    // A process that dies early closes its input while it is still being written.
    child.stdin?.on('error', () => undefined);
    child.stdin?.write(bytes);
    child.once('close', (code) => settle(why ? { ok: false, failed: why } : (answer.whole() ?? died(code))));

    function settle(converted: Converted): void {
      clearTimeout(timer);
      signal?.removeEventListener('abort', onAbort);
      closeQuietly(child);
      resolve(converted);
    }
  });
}

function died(code: number | null): Converted {
  if (code === EXIT.tooSlow) return { ok: false, failed: 'too-slow' };
  if (code === EXIT.tooMuchMemory) return { ok: false, failed: 'too-much-memory' };
  return { ok: false, failed: 'crashed' };
}

function closeQuietly(child: ChildProcess): void {
  child.stdin?.destroy();
  child.stdio[3]?.destroy();
}

/** The answer as it comes in: its head's length, its head, the coordinates; no more than was announced and allowed. */
class Answer {
  private head: Buffer = Buffer.alloc(0);
  private facts: Record<string, unknown> | null = null;
  private body = new Uint8Array(0);
  private filled = 0;

  constructor(private readonly mostTriangles: number) {}

  /** False where the answer is not one. */
  take(chunk: Buffer): boolean {
    if (this.facts) return this.fill(chunk);
    this.head = Buffer.concat([this.head, chunk]);
    if (this.head.length < 4) return true;
    const length = this.head.readUInt32LE(0);
    if (length > MOST_HEAD) return false;
    if (this.head.length < 4 + length) return true;
    try {
      this.facts = JSON.parse(this.head.toString('utf8', 4, 4 + length)) as Record<string, unknown>;
    } catch {
      return false;
    }
    const triangles = Number(this.facts.triangles ?? 0);
    if (this.facts.failed === undefined) {
      if (!(triangles > 0 && triangles <= this.mostTriangles)) return false;
      this.body = new Uint8Array(36 * triangles);
    }
    return this.fill(this.head.subarray(4 + length));
  }

  private fill(chunk: Uint8Array): boolean {
    if (this.filled + chunk.length > this.body.length) return false;
    this.body.set(chunk, this.filled);
    this.filled += chunk.length;
    return true;
  }

  whole(): Converted | null {
    const { facts, body } = this;
    if (facts === null || this.filled < body.length) return null;
    if (facts.failed !== undefined) return { ok: false, ...(facts as { failed: string }) };
    const { triangles, bodies, deflectionMm } = facts as Record<string, number>;
    return { ok: true, triangles, bodies, deflectionMm, coords: new Float32Array(body.buffer) };
  }
}

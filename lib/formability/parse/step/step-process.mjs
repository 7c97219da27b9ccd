// The converting process: `node step-process.mjs <bytes> <limits as JSON>`. It takes the file's bytes from standard input,
// which stays open: when it closes, whoever asked is gone, and so is this. Plain JavaScript, so that it starts without
// a loader in every deployment.
import { Socket } from 'node:net';
import { setFlagsFromString } from 'node:v8';
import { Worker } from 'node:worker_threads';
import { EXIT } from './exit-codes.mjs';

// Compiling the converter well takes longer than a small file needs in all: 1.8 s against 0.2 s of processor time for a
// cube, even at about 2 MB of file.
const SMALL_FILE = 2_000_000;

const length = Number(process.argv[2]);
if (length < SMALL_FILE) setFlagsFromString('--liftoff-only');
const limits = JSON.parse(process.argv[3]);
const input = new Uint8Array(new SharedArrayBuffer(length));
let filled = 0;

// The work is done in a thread, so that this one can watch the clock, the memory and the parent.
setTimeout(() => process.exit(EXIT.tooSlow), limits.wallMs);
setInterval(() => {
  if (process.memoryUsage.rss() > limits.memoryMb * 1e6) process.exit(EXIT.tooMuchMemory);
}, 100);
process.stdin.on('end', () => process.exit(EXIT.parentGone));
process.stdin.on('error', () => process.exit(EXIT.parentGone));
process.stdin.on('data', (chunk) => {
  if (filled + chunk.length > length) process.exit(EXIT.crashed);
  input.set(chunk, filled);
  filled += chunk.length;
  if (filled === length) convert();
});

function convert() {
  const thread = new Worker(new URL('./step-thread.mjs', import.meta.url), {
    workerData: { input, limits },
    resourceLimits: { maxOldGenerationSizeMb: limits.heapMb },
  });
  thread.once('error', (error) =>
    process.exit(error.code === 'ERR_WORKER_OUT_OF_MEMORY' ? EXIT.tooMuchMemory : EXIT.crashed),
  );
  thread.once('message', ({ answer, coords }) => {
    const head = Buffer.from(JSON.stringify(answer));
    const size = Buffer.alloc(4);
    size.writeUInt32LE(head.length);
    const out = new Socket({ fd: 3, readable: false, writable: true });
    out.once('error', () => process.exit(EXIT.parentGone));
    out.write(Buffer.concat([size, head]));
    // The parent ends this process once it has everything.
    if (coords) out.write(new Uint8Array(coords.buffer, coords.byteOffset, coords.byteLength));
    out.end(() => process.exit(EXIT.done));
  });
}

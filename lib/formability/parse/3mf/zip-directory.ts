import { UnusableInput } from '../../unusable-input';
import { MAX_ENTRIES } from './limits';
import { partKey } from './part-name';

/** One file of the archive; `start` and `end` bound its packed bytes. */
export interface ZipEntry {
  name: string;
  method: number;
  crc: number;
  start: number;
  end: number;
  /** As declared: checked while unpacking, never trusted. */
  unpackedBytes: number;
}

const END_OF_DIRECTORY = 0x06054b50;
const CENTRAL = 0x02014b50;
const LOCAL = 0x04034b50;
const LOCATOR_64 = 0x07064b50;
const END_64 = 0x06064b50;

/**
 * The archive's directory (PKWARE APPNOTE 6.3, §4.3), read where the bytes lie: every offset and size is held against
 * the file's real length, no two entries may share bytes or a name, and nothing is ever written to disk.
 * @returns entries by part name, without those whose name can be no part's name (`..`, backslash, absolute)
 * @throws UnusableInput empty, truncated, not_a_mesh, unsupported (encrypted, split), too_large_file
 */
export function readDirectory(bytes: Uint8Array): Map<string, ZipEntry> {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const { first, count, end } = findDirectory(view);
  if (count === 0) throw new UnusableInput('empty', 'the archive holds no files; export the 3MF again');
  if (count > MAX_ENTRIES) throw tooMany(String(count));
  const entries = new Map<string, ZipEntry>();
  const ranges: { from: number; to: number; name: string }[] = [];
  let at = first;
  for (let k = 0; k < count; k++) {
    if (at + 46 > end || view.getUint32(at, true) !== CENTRAL) {
      throw new UnusableInput('count_mismatch', `the archive's directory says ${count} files and holds ${k}; save the 3MF again`); // prettier-ignore
    }
    const nameLength = view.getUint16(at + 28, true);
    const extraLength = view.getUint16(at + 30, true);
    const next = at + 46 + nameLength + extraLength + view.getUint16(at + 32, true);
    if (next > end) throw damaged(`the directory entry ${k + 1} runs past the directory`);
    const entry = readEntry(view, bytes, at, first);
    ranges.push({ from: entry.local, to: entry.end, name: entry.name });
    keep(entries, entry);
    at = next;
  }
  if (at + 46 <= end && view.getUint32(at, true) === CENTRAL) {
    throw new UnusableInput('count_mismatch', `the archive's directory says ${count} files and holds more; save the 3MF again`); // prettier-ignore
  }
  ranges.sort((a, b) => a.from - b.from);
  for (let k = 1; k < ranges.length; k++) {
    if (ranges[k].from < ranges[k - 1].to) {
      throw damaged(`"${show(ranges[k - 1].name)}" and "${show(ranges[k].name)}" share the same bytes`);
    }
  }
  return entries;
}

function keep(entries: Map<string, ZipEntry>, entry: ZipEntry): void {
  const key = partKey(entry.name);
  if (key === null) return;
  if (entries.has(key)) throw damaged(`it holds "${show(entry.name)}" twice`);
  entries.set(key, entry);
}

function findDirectory(view: DataView): { first: number; count: number; end: number } {
  const length = view.byteLength;
  let at = length - 22;
  const lowest = Math.max(0, length - 22 - 0xffff);
  while (at >= lowest && !(view.getUint32(at, true) === END_OF_DIRECTORY && at + 22 + view.getUint16(at + 20, true) <= length)) at--; // prettier-ignore
  if (at < lowest) {
    throw new UnusableInput('truncated', `the file begins as a ZIP archive (3MF files are such) and ends after ${length} bytes without the archive's directory; upload it again or export it again`); // prettier-ignore
  }
  let count = view.getUint16(at + 10, true);
  let size = view.getUint32(at + 12, true);
  let first = view.getUint32(at + 16, true);
  let end = at;
  const split = view.getUint16(at + 4, true) !== view.getUint16(at + 6, true);
  if (count === 0xffff || size === 0xffffffff || first === 0xffffffff) {
    const at64 = findEnd64(view, at);
    count = number64(view, at64 + 32);
    size = number64(view, at64 + 40);
    first = number64(view, at64 + 48);
    end = at64;
  } else if (split || view.getUint16(at + 4, true) > 0) {
    throw new UnusableInput('unsupported', 'the archive is one of several volumes; save the 3MF as a single file'); // prettier-ignore
  }
  if (first + size > end) throw damaged('its directory lies outside the file');
  return { first, count, end: first + size };
}

function findEnd64(view: DataView, end: number): number {
  const locator = end - 20;
  if (locator < 0 || view.getUint32(locator, true) !== LOCATOR_64) {
    throw damaged('its directory is marked as ZIP64 and has none');
  }
  const at = number64(view, locator + 8);
  if (at + 56 > locator || view.getUint32(at, true) !== END_64) throw damaged('its ZIP64 directory is not where it says'); // prettier-ignore
  return at;
}

function readEntry(
  view: DataView,
  bytes: Uint8Array,
  at: number,
  limit: number,
): ZipEntry & { local: number } {
  const flags = view.getUint16(at + 8, true);
  const nameLength = view.getUint16(at + 28, true);
  const name = decode(bytes.subarray(at + 46, at + 46 + nameLength));
  if (flags & 0x2041) {
    throw new UnusableInput('unsupported', `"${show(name)}" in the archive is encrypted; save the 3MF without a password`); // prettier-ignore
  }
  const sizes = [view.getUint32(at + 24, true), view.getUint32(at + 20, true), view.getUint32(at + 42, true)];
  widen(view, at + 46 + nameLength, view.getUint16(at + 30, true), sizes);
  const [unpackedBytes, packedBytes, local] = sizes;
  if (local + 30 > limit || view.getUint32(local, true) !== LOCAL) {
    throw damaged(`"${show(name)}" is not where the directory says`);
  }
  const localName = view.getUint16(local + 26, true);
  const start = local + 30 + localName + view.getUint16(local + 28, true);
  const end = start + packedBytes;
  if (end > limit) throw damaged(`"${show(name)}" runs past the file's end`);
  if (decode(bytes.subarray(local + 30, local + 30 + localName)) !== name) {
    throw damaged(`"${show(name)}" has another name where its bytes lie`);
  }
  const method = view.getUint16(at + 10, true);
  return { name, method, crc: view.getUint32(at + 16, true), start, end, unpackedBytes, local };
}

/** Replaces sizes that read 0xFFFFFFFF by those of the ZIP64 extra field, in its fixed order. */
function widen(view: DataView, at: number, length: number, sizes: number[]): void {
  if (!sizes.includes(0xffffffff)) return;
  const end = at + length;
  while (at + 4 <= end) {
    const size = view.getUint16(at + 2, true);
    let field = at + 4;
    if (view.getUint16(at, true) === 1 && field + size <= end) {
      for (let k = 0; k < 3; k++) {
        if (sizes[k] !== 0xffffffff || field + 8 > at + 4 + size) continue;
        sizes[k] = number64(view, field);
        field += 8;
      }
      return;
    }
    at = field + size;
  }
}

function number64(view: DataView, at: number): number {
  return view.getUint32(at, true) + view.getUint32(at + 4, true) * 2 ** 32;
}

function decode(name: Uint8Array): string {
  return new TextDecoder().decode(name);
}

/** A name as it may stand in a message: one line, not long. */
export function show(name: string): string {
  const plain = name.replace(/[\u0000-\u001f\u007f-\u009f\u200b-\u200f\u2028-\u202e\u2066-\u2069]/g, '?');
  return plain.length > 80 ? `${plain.slice(0, 77)}…` : plain;
}

function damaged(what: string): UnusableInput {
  return new UnusableInput('not_a_mesh', `the archive is damaged: ${what}; save the 3MF again`);
}

function tooMany(count: string): UnusableInput {
  return new UnusableInput('too_large_file', `the archive holds ${count} files, more than the ${MAX_ENTRIES} that are read; save the 3MF without attachments`); // prettier-ignore
}

import { UnusableInput } from '../unusable-input';
import type { RawMesh } from './raw-mesh';
import { readAsciiStl } from './read-ascii-stl';
import { readBinaryStl } from './read-binary-stl';
import { read3mf } from './3mf/read-3mf';
import { MAX_FILE_BYTES } from './size-caps';
import { isStep, isZip, looksLikeText, nameOtherFormat } from './sniff-format';

/**
 * Reads a binary or ASCII STL or a 3MF; which one is told by size and content, never by a name or the word "solid".
 * A STEP file is turned into a mesh by `loadMesh`, which must wait for another process.
 * @throws UnusableInput with the code, the place and what to do.
 */
export function readMesh(bytes: Uint8Array): RawMesh {
  if (bytes.length === 0) {
    throw new UnusableInput('empty', 'the file has 0 bytes; export the mesh again and upload the new file');
  }
  if (bytes.length > MAX_FILE_BYTES) {
    throw new UnusableInput(
      'too_large_file',
      `the file has ${bytes.length} bytes, more than the ${MAX_FILE_BYTES} that are read; export it with a coarser tolerance`,
    );
  }
  if (isExactBinary(bytes)) return readBinaryStl(bytes);
  if (isZip(bytes)) return read3mf(bytes);
  if (isStep(bytes)) {
    throw new UnusableInput('unsupported', 'the file is a STEP model, which must be converted first; export it as STL or 3MF'); // prettier-ignore
  }
  const other = nameOtherFormat(bytes);
  if (other) throw new UnusableInput(other.code, other.message);
  if (looksLikeText(bytes)) return readAsciiStl(bytes);
  if (bytes.length < 84 && bytes.every((byte) => byte > 8 && byte < 127)) {
    throw new UnusableInput(
      'not_a_mesh',
      'the file is a short text, not a mesh; choose the STL, 3MF or STEP file of the template',
    );
  }
  return readBinaryStl(bytes);
}

function isExactBinary(bytes: Uint8Array): boolean {
  if (bytes.length < 84) return false;
  const count = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint32(80, true);
  return count > 0 && 84 + count * 50 === bytes.length;
}

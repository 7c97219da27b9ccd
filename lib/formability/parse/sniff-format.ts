import type { UnusableCode } from '../unusable-input';

interface OtherFormat {
  code: UnusableCode;
  message: string;
}

const SIGNATURES: { at: number; bytes: number[]; name: string; mesh: boolean }[] = [
  { at: 0, bytes: [0x89, 0x50, 0x4e, 0x47], name: 'a PNG picture', mesh: false },
  { at: 0, bytes: [0xff, 0xd8, 0xff], name: 'a JPEG picture', mesh: false },
  { at: 0, bytes: [0x47, 0x49, 0x46, 0x38], name: 'a GIF picture', mesh: false },
  { at: 8, bytes: [0x57, 0x45, 0x42, 0x50], name: 'a WebP picture', mesh: false },
  { at: 0, bytes: [0x25, 0x50, 0x44, 0x46], name: 'a PDF document', mesh: false },
  { at: 0, bytes: [0x1f, 0x8b], name: 'a gzip archive', mesh: false },
  { at: 0, bytes: [0x7f, 0x45, 0x4c, 0x46], name: 'a program', mesh: false },
  { at: 0, bytes: [0x67, 0x6c, 0x54, 0x46], name: 'a glTF model', mesh: true },
];

const TEXT_MARKS: { mark: RegExp; name: string; mesh: boolean }[] = [
  { mark: /^ply\s/, name: 'a PLY model', mesh: true },
  { mark: /^OFF\s/, name: 'an OFF model', mesh: true },
  { mark: /^\s*(#[^\n]*\n\s*)*(mtllib|o|g|v|vn|vt)\s+\S/, name: 'an OBJ model', mesh: true },
  { mark: /^\s*<(\?xml|!doctype|html|svg|model)/i, name: 'an XML or HTML document', mesh: false },
  { mark: /^\s*[{[]/, name: 'a JSON document', mesh: false },
];

/** True for a ZIP archive, whole, empty or one of several volumes: a 3MF, if anything. */
export function isZip(bytes: Uint8Array): boolean {
  return (
    bytes[0] === 0x50 && bytes[1] === 0x4b && [0x0304, 0x0506, 0x0708].includes(bytes[2] * 256 + bytes[3])
  );
}

/** True for a STEP file (ISO 10303-21 clear text), told by its first word, comments before it passed. */
export function isStep(bytes: Uint8Array): boolean {
  return /^\s*(\/\*[\s\S]*?\*\/\s*)*ISO-10303-21\s*;/.test(asciiHead(bytes, 4096));
}

/** Names what the file is when it is plainly something that is not read; null otherwise. */
export function nameOtherFormat(bytes: Uint8Array): OtherFormat | null {
  const signature = SIGNATURES.find((s) => s.bytes.every((byte, i) => bytes[s.at + i] === byte));
  if (signature) return describe(signature);
  const head = asciiHead(bytes, 600);
  if (/\bfacet\b/i.test(head)) return null;
  const text = TEXT_MARKS.find((t) => t.mark.test(head));
  return text ? describe(text) : null;
}

function describe(found: { name: string; mesh: boolean }): OtherFormat {
  return found.mesh
    ? {
        code: 'unsupported',
        message: `the file is ${found.name}; this engine reads STL, 3MF and STEP: export one of them`,
      }
    : {
        code: 'not_a_mesh',
        message: `the file is ${found.name}, not a mesh; choose the STL, 3MF or STEP file of the template`,
      };
}

function asciiHead(bytes: Uint8Array, length: number): string {
  let head = '';
  const start = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  for (let i = start; i < Math.min(bytes.length, length); i++) head += String.fromCharCode(bytes[i]);
  return head;
}

/** True where the first kilobyte reads as text of an ASCII STL: no control bytes, and one of its keywords. */
export function looksLikeText(bytes: Uint8Array): boolean {
  const end = Math.min(bytes.length, 1024);
  for (let i = 0; i < end; i++) {
    const byte = bytes[i];
    if (byte < 9 || (byte > 13 && byte < 32) || byte === 127) return false;
  }
  const head = asciiHead(bytes, 1024);
  return /^\s*solid\b/i.test(head) || /\b(facet|vertex|endsolid)\b/i.test(head) || head.trim() === '';
}

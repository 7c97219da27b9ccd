/** Names that the pack itself uses, and device names that Windows cannot unpack. */
const taken = new Set([
  'recipe.json',
  'report.json',
  'docket.json',
  'content.json',
  'signatures.json',
  'certificate.pdf',
  'readme.txt',
  'sha256sums',
]);
const device = /^(con|prn|aux|nul|com\d|lpt\d)(\.|$)/i;

/**
 * A person's file name as it may stand in an archive on any system: one path segment, no control characters or
 * reserved signs, no leading dot or dash, at most 120 bytes, and none of the pack's own names.
 */
export function safeName(fileName: string, fallback = 'mesh.stl'): string {
  const last = fileName.normalize('NFC').split(/[/\\]/).at(-1) ?? '';
  const plain = last.replace(
    /[\u0000-\u001f\u007f-\u009f\u200b-\u200f\u202a-\u202e\u2066-\u2069<>:"|?*]/g,
    '_',
  );
  const trimmed = shorten(plain.replace(/^[.\-\s]+/, '').replace(/[.\s]+$/, ''));
  if (trimmed === '') return fallback;
  return taken.has(trimmed.toLowerCase()) || device.test(trimmed) ? `mesh-${trimmed}` : trimmed;
}

/** Shortens the stem and keeps the extension. */
function shorten(name: string): string {
  const dot = name.lastIndexOf('.');
  const end = dot > 0 && name.length - dot <= 10 ? name.slice(dot) : '';
  let stem = end ? name.slice(0, dot) : name;
  while (Buffer.byteLength(stem + end) > 120) stem = Array.from(stem).slice(0, -1).join('');
  return stem + end;
}

import type { MeshFormat } from '@/lib/formability/report';

/** What the store is told while nobody knows yet what the bytes are. */
export const UNREAD_MEDIA_TYPE = 'application/octet-stream';

/** Media types as registered with IANA; both kinds of STL have one. */
const MEDIA_TYPES: Record<MeshFormat, string> = {
  'stl-binary': 'model/stl',
  'stl-ascii': 'model/stl',
  '3mf': 'model/3mf',
  step: 'model/step',
};

const ENDINGS: Record<MeshFormat, string[]> = {
  'stl-binary': ['.stl'],
  'stl-ascii': ['.stl'],
  '3mf': ['.3mf'],
  step: ['.step', '.stp'],
};

export const mediaTypeOf = (format: MeshFormat): string => MEDIA_TYPES[format];

/** True for formats that name their own unit of length: what was said beside the file does not count. */
export const hasOwnUnit = (format: MeshFormat): boolean => format === '3mf' || format === 'step';

/** The name under which a file goes out: with an ending that says what its bytes are, whatever it was called. */
export function nameByFormat(fileName: string, format: MeshFormat): string {
  const lower = fileName.toLowerCase();
  return ENDINGS[format].some((ending) => lower.endsWith(ending))
    ? fileName
    : `${fileName}${ENDINGS[format][0]}`;
}

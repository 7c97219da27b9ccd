import { UnusableInput } from '../../unusable-input';
import { MAX_RELATIONS_BYTES } from './limits';
import { resolveTarget } from './part-name';
import { readPart } from './read-part';
import type { Budget } from './unpack';
import { show, type ZipEntry } from './zip-directory';

const RELATIONSHIPS = 'http://schemas.openxmlformats.org/package/2006/relationships';
const START = 'http://schemas.microsoft.com/3dmanufacturing/2013/01/3dmodel';

/**
 * Key of the model part that `_rels/.rels` names as the start (OPC, ECMA-376 part 2, §9.3; 3MF Core Specification, §2.1).
 * @throws UnusableInput not_a_mesh where the archive is no 3MF
 */
export function findStartPart(bytes: Uint8Array, entries: Map<string, ZipEntry>, budget: Budget): string {
  const relations = entries.get('_rels/.rels');
  if (!relations) {
    throw new UnusableInput('not_a_mesh', 'the file is a ZIP archive and no 3MF: it has no _rels/.rels; unpack it and choose the mesh inside, or export a 3MF'); // prettier-ignore
  }
  const targets: string[] = [];
  let depth = 0;
  const handler = {
    open(tag: Parameters<Parameters<typeof readPart>[3]['open']>[0]) {
      depth++;
      if (depth !== 2 || tag.uri !== RELATIONSHIPS || tag.local !== 'Relationship') return;
      const outside = tag.attribute('TargetMode') === 'External';
      if (!outside && tag.attribute('Type') === START) targets.push(tag.attribute('Target') ?? '');
    },
    close() {
      depth--;
    },
  };
  readPart(bytes, relations, budget, handler, MAX_RELATIONS_BYTES);
  if (targets.length !== 1) {
    throw new UnusableInput('not_a_mesh', `the archive names ${targets.length === 0 ? 'no 3D model' : `${targets.length} 3D models`} as its start in _rels/.rels; export the 3MF again`); // prettier-ignore
  }
  const key = resolveTarget('', targets[0]);
  if (key === null || !entries.has(key)) {
    throw new UnusableInput('not_a_mesh', `_rels/.rels names "${show(targets[0])}" as the start, and the archive holds no such part; export the 3MF again`); // prettier-ignore
  }
  return key;
}

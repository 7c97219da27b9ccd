import { UnusableInput } from '../../unusable-input';
import type { RawMesh } from '../raw-mesh';
import { findStartPart } from './find-start-part';
import type { ModelPart } from './model';
import { ModelReader, type Tally } from './model-reader';
import { partKey } from './part-name';
import { placeObjects } from './place-objects';
import { readPart } from './read-part';
import { newBudget } from './unpack';
import { readDirectory, show } from './zip-directory';

/**
 * Reads the build of a 3MF (3MF Core Specification 1.3, Production Extension 1.1): all its items as one soup of facets,
 * in the unit of the start part, which wins over the recipe's; each part is read in its own unit. Only the relationships and the model parts that the
 * build needs are unpacked, in memory, as they are scanned; caps are absolute.
 * @throws UnusableInput empty, truncated, no_triangles, count_mismatch, non_finite, not_a_mesh, unsupported, too_large_file
 */
export function read3mf(bytes: Uint8Array): RawMesh {
  const entries = readDirectory(bytes);
  const budget = newBudget();
  const tally: Tally = { objects: 0, components: 0, vertices: 0, triangles: 0 };
  const parts = new Map<string, ModelPart>();
  const load = (key: string, owner: string): ModelPart => {
    const known = parts.get(key);
    if (known) return known;
    const entry = entries.get(key);
    if (!entry) {
      throw new UnusableInput('not_a_mesh', `${owner} asks for the part "${show(key)}", which the archive does not hold; export the 3MF again`); // prettier-ignore
    }
    const reader = new ModelReader(key, show(entry.name), tally);
    readPart(bytes, entry, budget, reader);
    parts.set(key, reader.part);
    return reader.part;
  };
  const start = load(findStartPart(bytes, entries, budget), '_rels/.rels');
  const assembled = placeObjects(start, (path, owner) => load(partKey(path) ?? path, owner));
  return { format: '3mf', unit: start.unit, warnings: [], ...assembled };
}

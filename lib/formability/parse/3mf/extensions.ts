import { UnusableInput } from '../../unusable-input';
import type { Tag } from './xml-tag';

export const CORE = 'http://schemas.microsoft.com/3dmanufacturing/core/2015/02';
export const PRODUCTION = 'http://schemas.microsoft.com/3dmanufacturing/production/2015/06';

/** Extensions that may be required, or stand inside a mesh: production is read, the others change no shape. */
export const HARMLESS: ReadonlySet<string> = new Set([
  CORE,
  PRODUCTION,
  'http://schemas.microsoft.com/3dmanufacturing/material/2015/02',
  'http://schemas.microsoft.com/3dmanufacturing/trianglesets/2021/07',
]);

/** @throws UnusableInput unsupported where the part cannot be read without an extension that is not known here. */
export function checkExtensions(root: Tag, where: string): void {
  const prefixes = (root.attribute('requiredextensions') ?? '').split(/\s+/).filter((word) => word !== '');
  for (const prefix of prefixes) {
    const uri = root.scope.uri(prefix);
    if (uri === undefined) {
      throw new UnusableInput('not_a_mesh', `${where} requires the extension "${prefix.slice(0, 40)}" and does not declare it; export the 3MF again`); // prettier-ignore
    }
    if (!HARMLESS.has(uri)) {
      throw new UnusableInput('unsupported', `${where} cannot be read without the extension ${uri.slice(0, 200)}, which is not read here; export it as a plain mesh (3MF core)`); // prettier-ignore
    }
  }
}

import { strToU8 } from 'fflate';
import { expect, it } from 'vitest';
import { ModelReader } from '@/lib/formability/parse/3mf/model-reader';
import { XmlScanner } from '@/lib/formability/parse/3mf/xml-scanner';
import { modelXml, objectXml } from '../../../../fixtures/meshes/write-3mf';

function nameKept(name: string): string | undefined {
  const reader = new ModelReader('a', 'a part', { objects: 0, components: 0, vertices: 0, triangles: 0 });
  const scanner = new XmlScanner(reader, 'a part');
  scanner.write(strToU8(modelXml([objectXml(1, '', `name="${name}"`)])));
  scanner.end();
  return reader.part.objects.get('1')?.name;
}

it.each([
  ['short', 'Küche 👉', 'Küche 👉'],
  ['of 80 characters', 'n'.repeat(80), 'n'.repeat(80)],
  ['of 100,000', 'n'.repeat(100_000), 'n'.repeat(80)],
  ['cut inside an emoji', `${'n'.repeat(79)}👉`, `${'n'.repeat(79)}\ufffd`],
])('of an object name %s, the first 80 characters are kept', (_, name, wanted) => {
  expect(nameKept(name)).toBe(wanted);
});

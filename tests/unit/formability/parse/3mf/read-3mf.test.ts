import { strToU8 } from 'fflate';
import JSZip from 'jszip';
import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { inspect } from '@/lib/formability/inspect';
import { readMesh } from '@/lib/formability/parse/read-mesh';
import { frustum } from '../../../../fixtures/meshes/solids';
import { moved, scaled, turned } from '../../../../fixtures/meshes/triangles';
import {
  componentsXml,
  meshXml,
  modelXml,
  objectXml,
  packed,
  plain3mf,
  relationsXml,
} from '../../../../fixtures/meshes/write-3mf';
import { binaryStl } from '../../../../fixtures/meshes/write-stl';

const near = (found: Float32Array, expected: number[]) => {
  expect(found).toHaveLength(expected.length);
  found.forEach((value, i) => expect(Math.abs(value - expected[i])).toBeLessThan(1e-4));
};

// A frustum of 60 × 40 × 20 mm at 5°: V = h (w d − s (w + d) + 4 s² / 3), s = h tan 5°.
const mesh = frustum(60, 40, 20, 5);
const inset = 20 * Math.tan((5 * Math.PI) / 180);
const volume = 20 * (60 * 40 - inset * 100 + (4 * inset * inset) / 3);
const one = objectXml(1, meshXml(mesh), 'type="model"');
const report = (bytes: Uint8Array) => analyse(bytes).report;

describe('a 3MF of one object', () => {
  it('gives the report that the same facets give as STL, format and hash aside', () => {
    const [from3mf, fromStl] = [report(plain3mf(mesh)), report(binaryStl(mesh))];
    expect(from3mf.input).toMatchObject({ format: '3mf', unit: 'mm', triangles: 12, bodies: 1 });
    expect({ ...from3mf, input: fromStl.input }).toEqual(fromStl);
  });

  it('is read stored as well as deflated, and from another packer that streams its sizes', async () => {
    const zip = new JSZip();
    zip.file('3D/3dmodel.model', modelXml([one]));
    zip.file('_rels/.rels', relationsXml());
    const streamed = await zip.generateAsync({
      type: 'uint8array',
      compression: 'DEFLATE',
      streamFiles: true,
    });
    const expected = readMesh(plain3mf(mesh)).coords;
    for (const bytes of [packed(modelXml([one]), {}, 0), streamed]) {
      expect(readMesh(bytes).coords).toEqual(expected);
    }
  });

  it('is told by content, wherever its start part lies and however it is named', () => {
    const bytes = packed('<nothing/>', {
      '_rels/.rels': strToU8(relationsXml('/geometry/Part%20One.model')),
      'Geometry/part one.model': strToU8(modelXml([one])),
    });
    expect(readMesh(bytes).triangles).toBe(12);
  });

  it.each([
    ['micron', 'micron', 0.001],
    ['millimeter', 'mm', 1],
    ['centimeter', 'cm', 10],
    ['inch', 'in', 25.4],
    ['foot', 'ft', 304.8],
    ['meter', 'm', 1000],
  ])('in %s: the file’s unit wins over the one that is asked for', (word, unit, mm) => {
    const found = inspect(plain3mf(mesh, `unit="${word}"`), 'cm');
    expect(found).toMatchObject({ format: '3mf', unit });
    expect(found.boundsMm.max[0]).toBeCloseTo(30 * mm, 6);
    const told = analyse(plain3mf(mesh, `unit="${word}"`), { mesh: { unit: 'cm' } }).report;
    expect([told.input.unit, told.recipe.mesh.unit]).toEqual([unit, unit]);
    expect(told.mesh.volumeMm3 / (volume * mm ** 3)).toBeCloseTo(1, 5);
  });

  it('is in millimetres where it names no unit', () => {
    expect(inspect(plain3mf(mesh, ''), 'in').unit).toBe('mm');
  });

  it('passes over metadata, materials, properties and elements of unknown extensions', () => {
    const triangleSets =
      '<t:trianglesets xmlns:t="http://schemas.microsoft.com/3dmanufacturing/trianglesets/2021/07"><t:triangleset name="a" identifier="a"><t:ref index="0"/></t:triangleset></t:trianglesets>';
    const dressed = modelXml(
      [
        '<basematerials id="9"><base name="a" displaycolor="#FFFFFF"/></basematerials>',
        `<x:thing xmlns:x="urn:x"><vertices><vertex x="9" y="9" z="9"/></vertices></x:thing>`,
        objectXml(
          1,
          `<metadatagroup><metadata name="a">b</metadata></metadatagroup>${meshXml(mesh)
            .replace('<triangle ', '<triangle pid="9" p1="0" ')
            .replace('</mesh>', `${triangleSets}</mesh>`)}`,
        ),
      ],
      ['objectid="1" partnumber="7"'],
      'xmlns:q="urn:q" recommendedextensions="q"',
    );
    expect(readMesh(packed(dressed)).triangles).toBe(12);
  });

  it('may write its namespace with a prefix, in UTF-16, with comments, CDATA and instructions', () => {
    const prefixed = modelXml([one])
      .replace(/<(\/?)(?!\?)/g, '<$1c:')
      .replace('xmlns="', 'xmlns:c="')
      .replace('<c:resources>', '<!-- a <vertex> - comment --><?note <x> ?><c:resources>')
      .replace('test &amp; more', '<![CDATA[ <vertex/> ]]>');
    const expected = readMesh(plain3mf(mesh)).coords;
    expect(readMesh(packed(prefixed)).coords).toEqual(expected);
    const wide = `\ufeff${modelXml([one]).replace('UTF-8', 'UTF-16')}`;
    const little = new Uint8Array(Buffer.from(wide, 'utf16le'));
    const big = new Uint8Array(Buffer.from(wide, 'utf16le').swap16());
    for (const bytes of [little, big]) expect(readMesh(packed(bytes)).coords).toEqual(expected);
    expect(readMesh(packed(new Uint8Array([0xef, 0xbb, 0xbf, ...strToU8(modelXml([one]))]))).triangles).toBe(
      12,
    );
  });

  it('reads numbers as a double reads them: digits, exponents, white space', () => {
    const text = modelXml([
      objectXml(
        1,
        `<mesh><vertices><vertex x=" -1.5e1 " y="+.25" z="0.1234567890123456789"/><vertex z='2E+1' x='10' y='0'/><vertex x="0" y="10" z="0"/></vertices>` +
          '<triangles><triangle v1="0" v2="1" v3=" 2 "/></triangles></mesh>',
      ),
    ]);
    expect([...readMesh(packed(text)).coords]).toEqual(
      [-15, 0.25, 0.1234567890123456789, 10, 0, 20, 0, 10, 0].map(Math.fround),
    );
  });
});

describe('build items and components', () => {
  // Row vectors: a quarter turn about Z takes x to y, then moves by (100, 0, 5).
  const quarter = 'transform="0 1 0 -1 0 0 0 0 1 100 0 5"';
  const coords = (...args: Parameters<typeof modelXml>) => readMesh(packed(modelXml(...args))).coords;
  it('places each item by its transform, as often as it is built', () => {
    near(coords([one], ['objectid="1"', `objectid="1" ${quarter}`]), [
      ...mesh,
      ...moved(turned(mesh, 90), 100, 0, 5),
    ]);
    expect(report(packed(modelXml([one], ['objectid="1"', `objectid="1" ${quarter}`])))).toMatchObject({
      input: { bodies: 2, triangles: 24 },
      mesh: { shells: 2 },
    });
  });

  it('applies the component’s transform before the item’s', () => {
    const group = objectXml(2, componentsXml(`objectid="1" ${quarter}`));
    near(coords([one, group], ['objectid="2" transform="2 0 0 0 2 0 0 0 2 1 1 1"']), // prettier-ignore
      moved(turned(mesh, 90), 100, 0, 5).map((value) => 2 * value + 1)); // prettier-ignore
  });

  it('turns the winding of a mirrored object, so that its volume stays positive', () => {
    const mirrored = report(packed(modelXml([one], ['objectid="1" transform="-1 0 0 0 1 0 0 0 1 0 0 0"'])));
    expect(mirrored.mesh.volumeMm3 / volume).toBeCloseTo(1, 5);
    expect(mirrored.mesh.warnings).toEqual([]);
  });

  it('scales no vertex twice: a component of a component of a component', () => {
    const chain = [2, 3, 4].map((id) => objectXml(id, componentsXml(`objectid="${id - 1}" transform="1 0 0 0 1 0 0 0 1 0 0 10"`))); // prettier-ignore
    near(coords([one, ...chain], ['objectid="4"']), moved(mesh, 0, 0, 30));
  });

  it('leaves out what is no part of the template, and says so; what the build does not name is not read', () => {
    const { input, mesh: found } = report(
      packed(
        modelXml(
          [
            one,
            ...['support', 'solidsupport', 'other'].map((type, k) =>
              objectXml(10 + k, meshXml(mesh), `type="${type}"`),
            ),
            objectXml(20, componentsXml('objectid="1"', 'objectid="10"')),
            objectXml(30, meshXml(moved(mesh, 500, 0, 0))),
            objectXml(40, meshXml(moved(mesh, 100, 0, 0)), 'type="surface"'),
          ],
          ['objectid="20"', 'objectid="11"', 'objectid="12"', 'objectid="40"', 'objectid="30" printable="0"'],
        ),
      ),
    );
    expect(input.bodies).toBe(2);
    expect(found.boundsMm.max[0]).toBe(130);
    expect(input.leftOut).toEqual([
      ...[[10, 'support'], [11, 'solidsupport'], [12, 'other']].map(([id, type]) => `object ${id} of 3D/3dmodel.model, of type ${type}`), // prettier-ignore
      'build item 5 of 3D/3dmodel.model, marked not to be printed',
    ]);
  });
});

describe('the production extension', () => {
  const other =
    'xmlns:r="http://schemas.microsoft.com/3dmanufacturing/production/2015/06" requiredextensions="r"';
  const part = (objects: string[], items: string[] = []) => strToU8(modelXml(objects, items));

  it('follows paths of items and components into other parts, whatever prefix it has, and ignores their builds', () => {
    const far = part([objectXml(7, meshXml(moved(mesh, 200, 0, 0))), one, objectXml(8, componentsXml('objectid="1"'))], ['objectid="7"']); // prettier-ignore
    const start = modelXml(
      [objectXml(2, componentsXml('r:path="/3D/far.model" objectid="8" r:UUID="x"', 'objectid="3"')), objectXml(3, meshXml(moved(mesh, 0, 100, 0)))], // prettier-ignore
      ['objectid="2" r:UUID="y"', 'r:path="/3D/Far.model" objectid="7"'],
      other,
    );
    const { bodies, coords } = readMesh(packed(start, { '3D/far.model': far }));
    expect(bodies).toBe(3);
    const wanted = [...mesh, ...moved(mesh, 0, 100, 0), ...moved(mesh, 200, 0, 0)];
    expect(coords).toEqual(Float32Array.from(wanted));
  });

  it('reads each part in its own unit, millimetres where it names none (3MF core, model@unit)', () => {
    const start = (unit: string) => modelXml([objectXml(2, componentsXml('r:path="/3D/far.model" objectid="1" transform="1 0 0 0 1 0 0 0 1 3 0 0"'))], ['objectid="2"', 'r:path="/3D/far.model" objectid="1"'], `${unit} ${other}`); // prettier-ignore
    // 3 in the start part's unit, on top of the far part's own size: 25.4 to 1, and 1 to 25.4.
    const far = (unit: string) => strToU8(modelXml([one], [], unit));
    const inches = readMesh(packed(start('unit="inch"'), { '3D/far.model': far('') }));
    expect(inches.unit).toBe('in');
    near(inches.coords, [...moved(scaled(mesh, 1 / 25.4), 3, 0, 0), ...scaled(mesh, 1 / 25.4)]);
    const back = readMesh(packed(start(''), { '3D/far.model': far('unit="inch"') }));
    expect(back.unit).toBe('mm');
    near(back.coords, [...moved(scaled(mesh, 25.4), 3, 0, 0), ...scaled(mesh, 25.4)]);
    const same = readMesh(packed(start('unit="inch"'), { '3D/far.model': far('unit="inch"') }));
    expect(same.coords).toEqual(Float32Array.from([...moved(mesh, 3, 0, 0), ...mesh]));
  });

  it('refuses a path from one part into a third', () => {
    const start = modelXml([], ['r:path="/3D/far.model" objectid="1"'], other);
    const pointing = part([objectXml(1, componentsXml('p:path="/3D/3dmodel.model" objectid="1"'))]);
    expect(() => readMesh(packed(start, { '3D/far.model': pointing }))).toThrow(
      /which only the start part may/,
    );
  });
});

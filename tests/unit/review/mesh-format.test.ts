import { describe, expect, it } from 'vitest';
import { StartUploadInput } from '@/lib/review/schemas';
import { hasOwnUnit, mediaTypeOf, nameByFormat } from '@/lib/review/mesh-format';

describe('a mesh goes out', () => {
  it.each([
    ['lid.stl', 'stl-ascii', 'lid.stl'],
    ['lid.STL', 'stl-binary', 'lid.STL'],
    ['lid.stl', '3mf', 'lid.stl.3mf'],
    ['lid.3MF', '3mf', 'lid.3MF'],
    ['lid.stp', 'step', 'lid.stp'],
    ['lid.STEP', 'step', 'lid.STEP'],
    ['lid', 'step', 'lid.step'],
    ['lid.3mf', 'stl-binary', 'lid.3mf.stl'],
  ] as const)('%s, which is %s, as %s', (name, format, expected) =>
    expect(nameByFormat(name, format)).toBe(expected),
  );

  it('under the media type of its content', () => {
    expect((['stl-binary', 'stl-ascii', '3mf', 'step'] as const).map(mediaTypeOf)).toEqual([
      'model/stl',
      'model/stl',
      'model/3mf',
      'model/step',
    ]);
  });

  it('with its own unit where the format has one', () => {
    expect((['stl-binary', 'stl-ascii', '3mf', 'step'] as const).map(hasOwnUnit)).toEqual([
      false,
      false,
      true,
      true,
    ]);
  });
});

describe('a STEP file that is too large', () => {
  const told = (fileName: string, bytes: number) => StartUploadInput.safeParse({ fileName, bytes });
  it('is told before it is sent, by its name', () => {
    expect(told('lid.step', 100_000_000).success).toBe(true);
    expect(told('lid.STP', 100_000_001).error?.issues[0]).toMatchObject({ path: ['bytes'], message: expect.stringContaining('100 MB') }); // prettier-ignore
    expect(told('lid.3mf', 500_000_000).success).toBe(true);
  });
});

import { describe, expect, it } from 'vitest';
import { isSameFile } from '@/app/w/[workspace]/templates/[template]/post/_hooks/is-same-file';

const known = { fileName: 'lid.stl', bytes: 684, lastModified: 1_790_000_000_000 };
const picked = { name: 'lid.stl', size: 684, lastModified: 1_790_000_000_000 };

describe('the file that sending goes on with', () => {
  it.each([
    ['is the same by name, size and time', picked, known, true],
    ['has another name', { ...picked, name: 'lid2.stl' }, known, false],
    ['has another size', { ...picked, size: 685 }, known, false],
    ['was exported anew at the same size', { ...picked, lastModified: 1_790_000_000_001 }, known, false],
    ['goes by name and size where no time was kept', picked, { ...known, lastModified: null }, true],
    [
      'is another one where no time was kept',
      { ...picked, size: 1 },
      { ...known, lastModified: null },
      false,
    ],
  ])('%s', (_, file, kept, same) => {
    expect(isSameFile(file, kept)).toBe(same);
  });
});

import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { FindingCard } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/finding-card';
import { basisWords } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/basis-words';
import { RoomProvider } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/room-context';
import type { FindingView } from '@/lib/review/schemas';
import { finding } from './fixtures/docket';
import { room } from './fixtures/room';

const words = (change: Partial<FindingView>) =>
  renderToStaticMarkup(
    <RoomProvider value={room()}>
      <FindingCard finding={finding(change)} itemKey="finding-1" actions={null} />
    </RoomProvider>,
  )
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll(/\s+/g, ' ');

const places = (count: number) =>
  Array.from({ length: count }, (_, i) => ({ at: [i, 0, 0] as [number, number, number], areaMm2: 1 }));

describe('a finding in the docket', () => {
  it('shows the measured figure beside the wanted one, and what they are computed from', () => {
    const text = words({});
    expect(text).toContain('measured 2.4°');
    expect(text).toContain('wanted 5.0');
    expect(text).toContain('how it is computed');
    expect(text).toContain('measured against the pull direction');
  });

  it('gives a sharp edge its two figures in words, without an empty bar', () => {
    const text = words({ checkId: 'edges', status: 'caution', measured: 0, limit: 0.8, unit: 'mm' });
    expect(text).toContain('measured 0 mm, at least 0.80 mm wanted');
  });

  it('counts the places that it does not list, and says so where there is none', () => {
    expect(words({ places: places(4) })).toContain('and 1 more place ');
    expect(words({ places: places(5) })).toContain('and 2 more places');
    expect(words({ places: [] })).toContain('concerns the whole template');
    expect(words({ places: [], status: 'pass' })).not.toContain('concerns');
  });

  it('explains nothing of a check that was not run', () => {
    const text = words({ checkId: 'heat', status: 'not-run', measured: null, limit: null, places: [] });
    expect(text).not.toContain('how it is computed');
    expect(text).not.toContain('basis');
  });
});

describe('the basis of a limit', () => {
  it('says once of which kind it is', () => {
    expect(basisWords({ source: 'common practice, no source: 0.4 mm', kind: 'common practice' })).toBe(
      'common practice, no source: 0.4 mm',
    );
    expect(
      basisWords({
        source: 'hole model, to be proven (common practice, no source)',
        kind: 'common practice',
      }),
    ).toBe('hole model, to be proven (common practice, no source)');
    expect(basisWords({ source: 'machine and recipe', kind: 'computed' })).toBe(
      'machine and recipe (computed from mesh and recipe)',
    );
  });
});

import { describe, expect, it } from 'vitest';
import { contentChanges } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/content-changes';
import type { ContentView } from '@/lib/review/schemas';
import { digest } from './fixtures/revision';

const other = digest.replaceAll('9', '0');
const content = (given: string, change: Partial<ContentView['summary']> = {}): ContentView => ({
  digest: given,
  content: {},
  summary: {
    revision: 'QP-014 revision C',
    meshSha256: digest,
    meshFile: 'tart-tray-c.stl',
    meshBytes: 100,
    recipe: [],
    verdict: 'fail',
    findings: [{ checkId: 'draft', status: 'fail', message: 'Two walls have 2.4°.', waived: null }],
    openItems: ['A. Brandt: the logo'],
    gatePlan: 'Forming, Studio, Client',
    ...change,
  },
});

describe('contentChanges', () => {
  it('says nothing while the digest is the same', () => {
    expect(contentChanges(content(digest), content(digest))).toEqual([]);
  });

  it('names a waiver with its reason', () => {
    const findings = [
      { checkId: 'draft', status: 'fail', message: 'Two walls have 2.4°.', waived: 'sanded by hand' },
    ];
    expect(contentChanges(content(digest), content(other, { findings }))).toEqual([
      'The finding on draft was waived: “sanded by hand”.',
    ]);
  });

  it('names items that were opened and items that are no longer open', () => {
    const changes = contentChanges(content(digest), content(other, { openItems: ['M. Ferro: the vents'] }));
    expect(changes).toEqual(['A new open item: M. Ferro: the vents', 'No longer open: A. Brandt: the logo']);
  });

  it('never stays silent about another digest', () => {
    expect(contentChanges(content(digest), content(other))).toHaveLength(1);
  });
});

import { describe, expect, it } from 'vitest';
import {
  byGroup,
  docketItems,
  filterItems,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/docket-items';
import { docket, finding, note, thread } from './fixtures/docket';
import { ids } from './fixtures/revision';

const groupsOf = (given: Parameters<typeof docket>[0]) => byGroup(docketItems(docket(given)));
const keys = (items: readonly { key: string }[]) => items.map((item) => item.key);

describe('the docket as one list', () => {
  it('shows a finding and the thread that answers it as one item', () => {
    const view = docket();
    const answered = docketItems(view).find((item) => item.finding?.checkId === 'draft');
    expect(answered?.thread?.findingId).toBe(answered?.finding?.id);
    expect(docketItems(view)).toHaveLength(view.findings.length + view.threads.length - 1);
  });

  it('puts failing findings before cautions, and those before what is fine', () => {
    const order = docketItems(docket())
      .filter((item) => item.finding)
      .map((item) => item.finding?.status);
    expect(order).toEqual(['fail', 'fail', 'caution', 'not-run', 'pass', 'pass']);
  });

  it('lets a waived failure count as settled, but not while its thread must be settled', () => {
    const waiver = { reason: 'tried on the earlier tray', by: 'L. Okafor', at: '2026-12-01T09:58:00.000Z' };
    const waived = finding({ waiver });
    expect(groupsOf({ findings: [waived], threads: [] }).settled).toHaveLength(1);
    const open = thread({ findingId: waived.id, mustSettle: true });
    expect(groupsOf({ findings: [waived], threads: [open] }).settle).toHaveLength(1);
  });

  it('keeps a failure open when only its thread was settled', () => {
    const failing = finding();
    const settled = thread({ findingId: failing.id, state: 'settled' });
    expect(groupsOf({ findings: [failing], threads: [settled] }).settle).toHaveLength(1);
  });

  it('takes a caution off the list to look at once its thread is settled', () => {
    const caution = finding({ status: 'caution' });
    expect(groupsOf({ findings: [caution], threads: [] }).look).toHaveLength(1);
    const settled = thread({ findingId: caution.id, state: 'settled' });
    expect(groupsOf({ findings: [caution], threads: [settled] }).settled).toHaveLength(1);
  });

  it('keeps what was not checked apart from what was found fine', () => {
    const groups = groupsOf({
      findings: [finding({ status: 'pass' }), finding({ status: 'not-run' })],
      threads: [],
    });
    expect(groups.fine).toHaveLength(1);
    expect(groups.unchecked).toHaveLength(1);
  });

  it('sets notes after the approval apart, whether they are about a finding or not', () => {
    const fine = finding({ status: 'pass' });
    const groups = groupsOf({
      findings: [fine],
      threads: [thread({ afterApproval: true }), thread({ afterApproval: true, findingId: fine.id })],
    });
    expect(groups.after).toHaveLength(2);
    expect(groups.fine).toHaveLength(1);
  });

  it('shows a thread about a finding of another revision by itself', () => {
    const groups = groupsOf({ findings: [], threads: [thread({ findingId: ids.client })] });
    expect(groups.look).toHaveLength(1);
  });
});

describe('the filter', () => {
  const view = docket();
  const items = docketItems(view);
  const filtered = (
    search: string,
    kind: 'all' | 'findings' | 'notes' | 'mine' = 'all',
    person = ids.brandt,
  ) => filterItems(items, { search, kind }, person);

  it('leaves everything when nothing is asked', () => {
    expect(keys(filtered(''))).toEqual(keys(items));
  });

  it('wants every word, anywhere in finding or notes, in any case', () => {
    expect(filtered('LOGO flat')).toHaveLength(1);
    expect(filtered('logo undercuts')).toHaveLength(0);
    expect(filtered('rounder rim').map((item) => item.finding?.checkId)).toEqual(['draft']);
  });

  it('tells findings from notes; an answered finding is both', () => {
    expect(filtered('', 'findings')).toHaveLength(view.findings.length);
    expect(filtered('', 'notes')).toHaveLength(view.threads.length);
  });

  it('knows what is with me: I wrote in it, or a note mentions me', () => {
    const mention = {
      type: 'doc',
      content: [
        { type: 'paragraph', content: [{ type: 'mention', attrs: { id: ids.okafor, label: 'L. Okafor' } }] },
      ],
    };
    const other = thread({ notes: [note('Look at this', { body: mention })] });
    const all = docketItems(docket({ threads: [thread(), other] }));
    expect(keys(filterItems(all, { search: '', kind: 'mine' }, ids.okafor))).toEqual([`thread-${other.id}`]);
    expect(filterItems(all, { search: '', kind: 'mine' }, ids.brandt)).toHaveLength(2);
  });
});

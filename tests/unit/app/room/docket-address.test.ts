import { describe, expect, it } from 'vitest';
import {
  readAddress,
  writeAddress,
  type DocketAddress,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_hooks/use-docket-filter';

const read = (query: string) => readAddress(new URLSearchParams(query));

describe('the docket in the address', () => {
  it.each<[DocketAddress]>([
    [{ filter: { search: 'corner n', kind: 'mine' }, item: 'thread-1' }],
    [{ filter: { search: 'ø & =?#', kind: 'all' }, item: null }],
    [{ filter: { search: '', kind: 'findings' }, item: 'finding-2' }],
  ])('comes back as it was written: %j', (address) => {
    expect(read(writeAddress('', address))).toEqual(address);
  });

  it('leaves no trace of what is not set, and leaves other parts alone', () => {
    const nothing: DocketAddress = { filter: { search: '', kind: 'all' }, item: null };
    expect(writeAddress('?q=old&kind=notes&item=x', nothing)).toBe('');
    expect(writeAddress('?from=mail&q=old', nothing)).toBe('?from=mail');
  });

  it('takes an unknown kind for everything', () => {
    expect(read('kind=whatever').filter.kind).toBe('all');
  });
});

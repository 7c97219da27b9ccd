import { describe, expect, it } from 'vitest';
import { filterPeople } from '@/app/_components/note-editor/filter-people';
import { isBlank } from '@/app/_components/note-editor/is-blank';

const people = ['Lewin Okafor', 'Mara Ferro', 'Jun Halvorsen', 'Zoë Anne-Marie Dvořák'].map((name, i) => ({
  id: String(i),
  name,
  side: 'studio' as const,
}));
const found = (query: string) => filterPeople(people, query).map((person) => person.name);

describe('filterPeople', () => {
  it('finds by the beginning of any word of the name, in any case', () => {
    expect(found('fe')).toEqual(['Mara Ferro']);
    expect(found('MAR')).toEqual(['Mara Ferro', 'Zoë Anne-Marie Dvořák']);
    expect(found('erro')).toEqual([]);
  });

  it('does not mind accents', () => {
    expect(found('zoe')).toEqual(['Zoë Anne-Marie Dvořák']);
    expect(found('dvor')).toEqual(['Zoë Anne-Marie Dvořák']);
  });

  it('shows the first eight for nothing typed', () => {
    const crowd = Array.from({ length: 20 }, (_, i) => ({
      id: `${i}`,
      name: `P${i}`,
      side: 'client' as const,
    }));
    expect(filterPeople(crowd, '')).toHaveLength(8);
  });
});

describe('isBlank', () => {
  const doc = (...content: unknown[]) => ({ type: 'doc', content });
  it('knows a note without words', () => {
    expect(isBlank(doc())).toBe(true);
    expect(
      isBlank(doc({ type: 'paragraph' }, { type: 'paragraph', content: [{ type: 'text', text: '  ' }] })),
    ).toBe(true);
  });
  it('counts words and mentions', () => {
    expect(isBlank(doc({ type: 'paragraph', content: [{ type: 'text', text: 'a' }] }))).toBe(false);
    expect(isBlank(doc({ type: 'paragraph', content: [{ type: 'mention', attrs: { id: '1' } }] }))).toBe(
      false,
    );
  });
});

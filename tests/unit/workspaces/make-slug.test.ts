import { describe, expect, it } from 'vitest';
import { makeSlug } from '@/lib/workspaces/make-slug';

describe('makeSlug', () => {
  it.each([
    ['Harbour Foods', /^harbour-foods-[a-z2-9]{4}$/],
    ['Moulin & Söhne Ltd', /^moulin-sohne-ltd-[a-z2-9]{4}$/],
    ['  --  ', /^space-[a-z2-9]{4}$/],
    ['日本', /^space-[a-z2-9]{4}$/],
    ['x'.repeat(80), /^x{40}-[a-z2-9]{4}$/],
  ])('makes an address part of %j', (name, form) => {
    expect(makeSlug(name)).toMatch(form);
  });

  it('gives the same name another tail each time, so that a tail tells nothing', () => {
    const made = new Set(Array.from({ length: 50 }, () => makeSlug('Harbour Foods')));
    expect(made.size).toBeGreaterThan(45);
  });
});

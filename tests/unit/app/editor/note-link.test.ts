import { describe, expect, it } from 'vitest';
import { hrefFromTyping } from '@/app/_components/note-editor/note-link';

describe('hrefFromTyping', () => {
  it.each([
    ['https://example.org/a', 'https://example.org/a'],
    ['  example.org/drawings ', 'https://example.org/drawings'],
    ['example.org:8443/a', 'https://example.org:8443/a'],
    ['mara@larkfield.example', 'mailto:mara@larkfield.example'],
    ['mailto:mara@larkfield.example', 'mailto:mara@larkfield.example'],
  ])('%s becomes %s', (typed, href) => {
    expect(hrefFromTyping(typed)).toBe(href);
  });

  it.each([
    '',
    '   ',
    'rim',
    'javascript:alert(1)',
    'ftp://example.org/a',
    'data:text/html,x',
    'see the rim',
  ])('%j is no address', (typed) => {
    expect(hrefFromTyping(typed)).toBeNull();
  });
});

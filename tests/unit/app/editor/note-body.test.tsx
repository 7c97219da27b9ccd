import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { NoteBody } from '@/app/_components/note-editor/note-body';

const doc = (...content: unknown[]) => ({ type: 'doc', content });
const paragraph = (...content: unknown[]) => ({ type: 'paragraph', content });
const text = (words: string, ...marks: unknown[]) => ({ type: 'text', text: words, marks });
const html = (body: Record<string, unknown>) => renderToStaticMarkup(<NoteBody body={body} />);

describe('NoteBody', () => {
  it('renders what a note can hold', () => {
    const out = html(
      doc(
        paragraph(text('bold', { type: 'bold' }), text(' and '), text('slanted', { type: 'italic' })),
        { type: 'bulletList', content: [{ type: 'listItem', content: [paragraph(text('one'))] }] },
        {
          type: 'orderedList',
          attrs: { start: 3 },
          content: [{ type: 'listItem', content: [paragraph(text('x'))] }],
        },
        { type: 'blockquote', content: [paragraph(text('said before'))] },
        paragraph(
          { type: 'mention', attrs: { id: '1', label: 'M. Ferro' } },
          { type: 'hardBreak' },
          text('see'),
        ),
      ),
    );
    expect(out).toMatch(/<strong[^>]*>bold<\/strong>/);
    expect(out).toMatch(/<em>slanted<\/em>/);
    expect(out).toMatch(/<ul[^>]*><li><p[^>]*>one/);
    expect(out).toMatch(/<ol[^>]*start="3"/);
    expect(out).toMatch(/<blockquote[^>]*><p[^>]*>said before/);
    expect(out).toMatch(/@M\. Ferro<\/span><br\/>see/);
  });

  it('opens links apart and tells the other side nothing', () => {
    const link = { type: 'link', attrs: { href: 'https://example.org/a?b=1' } };
    expect(html(doc(paragraph(text('here', link))))).toMatch(
      /<a href="https:\/\/example\.org\/a\?b=1" target="_blank" rel="noopener noreferrer nofollow"[^>]*>here<\/a>/,
    );
  });

  it.each([
    'javascript:alert(1)',
    'data:text/html,x',
    'JaVaScRiPt:alert(1)',
    '//example.org',
    'https://',
    42,
    null,
  ])('keeps the words and drops the link to %s', (href) => {
    const out = html(doc(paragraph(text('here', { type: 'link', attrs: { href } }))));
    expect(out).toContain('here');
    expect(out).not.toContain('<a');
  });

  it('shows markup in text as text', () => {
    expect(html(doc(paragraph(text('<img src=x onerror=alert(1)>'))))).toContain('&lt;img src=x');
  });

  it('shows only the words of parts and marks that a note cannot hold', () => {
    const out = html(
      doc(
        { type: 'iframe', attrs: { src: 'https://example.org' }, content: [text('inside')] },
        paragraph(text('red', { type: 'textStyle', attrs: { style: 'color:red' } })),
      ),
    );
    expect(out).toContain('inside');
    expect(out).toContain('red');
    expect(out).not.toMatch(/iframe|style=|example\.org/);
  });
});

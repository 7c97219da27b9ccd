import { SaxesParser } from 'saxes';
import { describe, expect, it } from 'vitest';
import { XmlScanner } from '@/lib/formability/parse/3mf/xml-scanner';
import type { Tag } from '@/lib/formability/parse/3mf/xml-tag';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { frustum } from '../../../../fixtures/meshes/solids';
import { meshXml, modelXml, objectXml } from '../../../../fixtures/meshes/write-3mf';
import { dice } from '../../dice';

/** Elements and attributes in order, or null where the text is refused. */
function ours(bytes: Uint8Array, step = 1 << 16): string[] | null {
  const events: string[] = [];
  const scanner = new XmlScanner(
    {
      open(tag: Tag) {
        const attributes = Array.from({ length: tag.count }, (_, k) => `${tag.name(k)}=${tag.value(k)}`);
        events.push(`{${tag.uri.trim()}}${tag.local} ${attributes.join(' ')}`);
      },
      close: () => events.push('/'),
    },
    'a part',
  );
  try {
    for (let at = 0; at < bytes.length; at += step) scanner.write(bytes.subarray(at, at + step));
    scanner.end();
    return events;
  } catch (error) {
    if (error instanceof UnusableInput) return null;
    throw error;
  }
}

/** The same by saxes, a full XML parser. */
function theirs(bytes: Uint8Array): string[] | null {
  const events: string[] = [];
  const parser = new SaxesParser({ xmlns: true });
  let wrong = false;
  parser.on('error', () => (wrong = true));
  parser.on('doctype', () => (wrong = true));
  parser.on('opentag', ({ uri, local, attributes }) => {
    const list = Object.values(attributes).map(({ name, value }) => `${name}=${value}`);
    events.push(`{${uri.trim()}}${local} ${list.join(' ')}`);
  });
  parser.on('closetag', () => events.push('/'));
  parser.write(new TextDecoder().decode(bytes)).close();
  return wrong ? null : events;
}

const model = modelXml([objectXml(1, meshXml(frustum(60, 40, 20, 5)), 'name="a &lt;b&gt; &#233; &#x41;"')])
  .replace('<resources>', '<!-- <note> --><?pi x?><resources xmlns:q="urn:q"><q:a q:b="1"/>')
  .replace('test &amp; more', 'tab&#9;<![CDATA[<x>]]>');

describe('the scanner against saxes', () => {
  const bytes = new TextEncoder().encode(model);

  it('sees the same elements, attributes and namespaces', () => {
    const found = ours(bytes);
    expect(found).toHaveLength(60);
    expect(found).toEqual(theirs(bytes));
  });

  it('does so wherever the bytes are cut', () => {
    const whole = ours(bytes);
    for (const step of [1, 2, 3, 7, 64]) expect(ours(bytes, step)).toEqual(whole);
  });

  it('takes nothing that saxes refuses, and reads the rest alike, in 4,000 mutations (xorshift seed 77)', () => {
    const roll = dice(77);
    const marks = ['<', '>', '/', '"', "'", '=', '&', ';', '!', '-', '?', ' ', ':', ']', '\n', 'x', '<!--', '-->', '<x>', '</x>', '&amp;']; // prettier-ignore
    let taken = 0;
    let stricter = 0;
    for (let n = 0; n < 4000; n++) {
      const at = 40 + roll(model.length - 40);
      const text = model.slice(0, at) + marks[roll(marks.length)] + model.slice(at + roll(3));
      const mutated = new TextEncoder().encode(text);
      const [found, expected] = [ours(mutated), theirs(mutated)];
      if (found === null) {
        if (expected !== null) stricter++;
        continue;
      }
      taken++;
      // Text between elements is passed over, so what is wrong only there is not judged.
      if (expected !== null) expect(found, text.slice(at - 30, at + 30)).toEqual(expected);
      else expect(text).toMatch(/\]\]>/);
    }
    expect(taken).toBeGreaterThan(800);
    expect(stricter).toBeLessThan(taken / 100);
  });
});

describe('what is refused outright', () => {
  it.each([
    ['a document type', '<!DOCTYPE a [<!ENTITY b "c">]><a/>'],
    ['a document type in small letters', '<!doctype a><a/>'],
    ['an external entity', '<!DOCTYPE a SYSTEM "http://127.0.0.1:9/x"><a>&x;</a>'],
    ['an entity declaration', '<a><!ENTITY b "c"></a>'],
    ['an entity that XML does not have', '<a b="&bomb;"/>'],
    ['another encoding', '<?xml version="1.0" encoding="utf-7"?><a/>'],
    ['two attributes of one name', '<a b="1" b="2"/>'],
    ['two attributes of one name among many', '<a b="1" c="2" d="3" e="4" f="5" b="6"/>'],
    ['two roots', '<a/><b/>'],
    ['text after the root', '<a/>x'],
    ['crossed tags', '<a><b></a></b>'],
    ['a bound prefix missing', '<q:a/>'],
    ['an attribute without quotes', '<a b=1/>'],
    ['a "<" in a value', '<a b="<"/>'],
    ['a control character', '<a>\u0001</a>'],
    ['nothing at all', '   '],
    ['an open end', '<a><b/>'],
    ['"--" in a comment', '<a><!-- a -- b --></a>'],
    ['a depth of 101', '<a>'.repeat(101) + '</a>'.repeat(101)],
  ])('%s', (_, text) => expect(ours(new TextEncoder().encode(text))).toBeNull());

  it('a depth of 100,000 and a tag of a million attributes, in little memory', () => {
    expect(ours(new TextEncoder().encode('<a>'.repeat(100_000)))).toBeNull();
    const wide = Array.from({ length: 1_000_000 }, (_, k) => `a${k}="1"`).join(' ');
    expect(ours(new TextEncoder().encode(`<a ${wide}/>`))).toBeNull();
  });
});

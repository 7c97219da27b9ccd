import { UnusableInput } from '../../unusable-input';
import { MAX_TAG_BYTES, MAX_XML_DEPTH } from './limits';
import { checkDeclaration } from './xml-declaration';
import { decode, ENTITY, Scope, Tag } from './xml-tag';

export interface XmlHandler {
  /** Attributes lie in `tag`, which is used again for the next one. */
  open(tag: Tag): void;
  close(): void;
}

interface Name {
  bytes: Uint8Array;
  raw: string;
  uri: string;
  local: string;
  scope: Scope;
}

const WINDOW = 1 << 20;
const [LT, GT, AMP, SLASH, BANG, QUERY, EQUALS, QUOTE, APOS, COLON] = [
  60, 62, 38, 47, 33, 63, 61, 34, 39, 58,
];

/**
 * Reads XML as its bytes come (XML 1.0 with namespaces), without a DTD: a document type or entity declaration is
 * refused outright, whatever is in it. Memory is one window, however large the document.
 *
 * Own code instead of a package for speed: over the 81 MB of a million triangles saxes 6 takes five times as long (1.6 s
 * and more of processor time against 0.3 s), before any number is read; tests hold it against saxes, event by event.
 * @throws UnusableInput not_a_mesh (not well-formed), truncated, unsupported (DTD, another encoding)
 */
export class XmlScanner {
  private readonly window = new Uint8Array(WINDOW + MAX_TAG_BYTES);
  private filled = 0;
  /** Bytes of the document before the window. */
  private before = 0;
  private until: string | null = null;
  private seenRoot = false;
  private readonly open: Name[] = [];
  private readonly scopes: Scope[] = [];
  private scope = new Scope(null, new Map());
  private readonly tag = new Tag(this.window);
  private last: Name | null = null;

  constructor(
    private readonly handler: XmlHandler,
    /** Name of the part, for messages. */
    private readonly where: string,
    private readonly utf16 = false,
  ) {}

  write(chunk: Uint8Array): void {
    for (let at = 0; at < chunk.length;) {
      const room = Math.min(this.window.length - this.filled, chunk.length - at);
      this.window.set(chunk.subarray(at, at + room), this.filled);
      this.filled += room;
      at += room;
      if (this.filled === this.window.length) this.scan(false);
    }
  }

  end(): void {
    this.scan(true);
    if (this.open.length > 0) {
      throw this.cut(`inside <${this.open[this.open.length - 1].raw}>`);
    }
    if (!this.seenRoot) throw this.cut('before the first element');
  }

  private scan(final: boolean): void {
    const b = this.window;
    const end = this.filled;
    let at = this.before === 0 && b[0] === 0xef && b[1] === 0xbb && b[2] === 0xbf ? 3 : 0;
    while (at < end) {
      const next = this.until !== null ? this.skipTo(at, end) : b[at] === LT ? this.markup(at, end) : this.text(at, end); // prettier-ignore
      if (next < 0) break;
      at = next;
    }
    if (end - at > MAX_TAG_BYTES) throw this.refuse(at, `has a tag of more than ${MAX_TAG_BYTES / 1024} kB`);
    if (final && at < end) throw this.cut(b[at] === LT || this.until ? 'inside a tag or comment' : 'inside an entity'); // prettier-ignore
    b.copyWithin(0, at, end);
    this.before += at;
    this.filled = end - at;
  }

  /** Passes text; -1 where an entity is not all there yet. */
  private text(from: number, end: number): number {
    const b = this.window;
    let i = from;
    for (; i < end && b[i] !== LT; i++) {
      if (b[i] <= 32) {
        if (b[i] !== 32 && b[i] !== 10 && b[i] !== 13 && b[i] !== 9)
          throw this.refuse(i, 'has a control character');
      } else if (this.open.length === 0) throw this.refuse(i, 'has text outside its root element');
      else if (b[i] === AMP) {
        const stop = this.entity(i, end);
        if (stop < 0) {
          if (i === from) return -1;
          return i;
        }
        i = stop;
      }
    }
    return i;
  }

  /** Index of the semicolon; -1 where it is not there yet. */
  private entity(from: number, end: number): number {
    const b = this.window;
    for (let i = from; i < Math.min(end, from + 12); i++) {
      if (b[i] !== 59) continue;
      const text = decode(b, from, i + 1);
      if (!ENTITY.test(text)) throw this.refuse(from, `has the unknown entity ${text}`);
      return i;
    }
    if (end - from < 12) return -1;
    throw this.refuse(from, 'has an "&" that begins no entity');
  }

  private skipTo(from: number, end: number): number {
    const mark = this.until as string;
    const [first, length] = [mark.charCodeAt(0), mark.length];
    for (let i = from; i + length <= end; i++) {
      if (this.window[i] !== first) continue;
      let k = 1;
      while (k < length && this.window[i + k] === mark.charCodeAt(k)) k++;
      if (k < length) continue;
      // A comment ends at its first "--"; one that goes on is not well-formed.
      if (mark === '--') {
        if (i + 2 >= end) return i > from ? i : -1;
        if (this.window[i + 2] !== GT) throw this.refuse(i, 'has "--" inside a comment');
        this.until = null;
        return i + 3;
      }
      this.until = null;
      return i + length;
    }
    const kept = Math.max(from, end - length + 1);
    return kept > from ? kept : -1;
  }

  private markup(at: number, end: number): number {
    const b = this.window;
    if (at + 1 >= end) return -1;
    const second = b[at + 1];
    if (second === SLASH) return this.closeTag(at, end);
    if (second === BANG) return this.declaration(at, end);
    if (second === QUERY) return this.instruction(at, end);
    return this.openTag(at, end);
  }

  private declaration(at: number, end: number): number {
    if (end - at < 9) return -1;
    const head = decode(this.window, at, at + 9);
    if (head.startsWith('<!--')) this.until = '--';
    else if (head === '<![CDATA[' && this.open.length > 0) this.until = ']]>';
    else if (/^<!(doctype|entity|element|attlist)/i.test(head)) {
      throw new UnusableInput('unsupported', `${this.where} declares a document type or entities; 3MF forbids them and nothing is done with them: save the 3MF again`); // prettier-ignore
    } else throw this.refuse(at, 'has an unknown "<!" declaration');
    return at + (this.until === '--' ? 4 : 9);
  }

  private instruction(at: number, end: number): number {
    const b = this.window;
    for (let i = at + 2; i + 1 < end; i++) {
      if (b[i] !== QUERY || b[i + 1] !== GT) continue;
      const text = decode(b, at, i + 2);
      if (/^<\?xml[\s?]/i.test(text)) {
        const atStart = this.before + at === 0 || (this.before + at === 3 && b[0] === 0xef);
        if (!atStart) throw this.refuse(at, 'has an XML declaration that is not at its beginning');
        checkDeclaration(text, this.where, this.utf16);
      } else if (!/^<\?[\p{L}_:]/u.test(text)) throw this.refuse(at, 'has a nameless processing instruction');
      return i + 2;
    }
    return -1;
  }

  private closeTag(at: number, end: number): number {
    const b = this.window;
    const name = this.open[this.open.length - 1];
    let i = at + 2;
    while (i < end && b[i] !== GT) i++;
    if (i === end) return -1;
    const found = i + 1;
    while (i > at + 2 && isSpace(b[i - 1])) i--;
    if (name === undefined || !same(b, at + 2, i, name.bytes)) {
      const raw = decode(b, at + 2, Math.min(i, at + 42));
      throw this.refuse(at, name ? `closes <${raw}> where <${name.raw}> is open` : `closes <${raw}>, which is not open`); // prettier-ignore
    }
    this.shut();
    return found;
  }

  private shut(): void {
    this.open.pop();
    this.scope = this.scopes.pop() as Scope;
    this.handler.close();
  }

  private openTag(at: number, end: number): number {
    const b = this.window;
    const { tag } = this;
    let i = at + 1;
    while (i < end && !isDelimiter(b[i])) i++;
    if (i === end) return -1;
    const nameEnd = i;
    if (nameEnd === at + 1) throw this.refuse(at, 'has a "<" that begins no tag');
    tag.count = 0;
    let binds = false;
    for (;;) {
      const spaced = i < end && isSpace(b[i]);
      while (i < end && isSpace(b[i])) i++;
      if (i >= end) return -1;
      if (b[i] === GT || b[i] === SLASH) break;
      if (!spaced) throw this.refuse(i, 'has attributes that are not parted by a space');
      const nameFrom = i;
      while (i < end && !isDelimiter(b[i]) && b[i] !== EQUALS) i++;
      const nameTo = i;
      while (i < end && isSpace(b[i])) i++;
      if (i >= end) return -1;
      if (b[i] !== EQUALS || nameTo === nameFrom)
        throw this.refuse(nameFrom, 'has an attribute without a value');
      i++;
      while (i < end && isSpace(b[i])) i++;
      if (i >= end) return -1;
      const quote = b[i++];
      if (quote !== QUOTE && quote !== APOS)
        throw this.refuse(i - 1, 'has an attribute value without quotes');
      const from = i;
      while (i < end && b[i] !== quote) {
        if (b[i] === LT) throw this.refuse(i, 'has a "<" inside an attribute value');
        if (b[i] < 32 && !isSpace(b[i])) throw this.refuse(i, 'has a control character');
        if (b[i] === AMP) {
          const stop = this.entity(i, end);
          if (stop < 0) return -1;
          i = stop;
        }
        i++;
      }
      if (i >= end) return -1;
      tag.add(nameFrom, nameTo, from, i);
      i++;
      if (b[nameFrom] === 120 && b[nameFrom + 1] === 109 && b[nameFrom + 2] === 108 && b[nameFrom + 3] === 110) binds = true; // prettier-ignore
    }
    const empty = b[i] === SLASH;
    if (empty && i + 1 >= end) return -1;
    if (empty && b[++i] !== GT) throw this.refuse(i, 'has a "/" inside a tag');
    this.enter(at, nameEnd, binds, empty);
    return i + 1;
  }

  private enter(at: number, nameEnd: number, binds: boolean, empty: boolean): void {
    const { tag } = this;
    if (this.open.length === 0 && this.seenRoot) throw this.refuse(at, 'has a second root element');
    if (this.open.length >= MAX_XML_DEPTH)
      throw this.refuse(at, `nests its elements more than ${MAX_XML_DEPTH} deep`);
    this.seenRoot = true;
    this.refuseDoubles(at);
    this.scopes.push(this.scope);
    if (binds) this.bind();
    const name = this.nameOf(at, nameEnd);
    this.open.push(name);
    tag.uri = name.uri;
    tag.local = name.local;
    tag.scope = this.scope;
    this.handler.open(tag);
    if (empty) this.shut();
  }

  private refuseDoubles(at: number): void {
    const { tag } = this;
    if (tag.count < 2) return;
    if (tag.count <= 4) {
      for (let k = 1; k < tag.count; k++) {
        for (let j = 0; j < k; j++) if (tag.sameName(j, k)) throw this.refuse(at, `has the attribute ${tag.name(k)} twice`); // prettier-ignore
      }
      return;
    }
    const seen = new Set<string>();
    for (let k = 0; k < tag.count; k++) {
      if (seen.has(tag.name(k))) throw this.refuse(at, `has the attribute ${tag.name(k)} twice`);
      seen.add(tag.name(k));
    }
  }

  private bind(): void {
    const bound = new Map<string, string>();
    for (let k = 0; k < this.tag.count; k++) {
      const name = this.tag.name(k);
      if (name === 'xmlns') bound.set('', this.tag.value(k));
      else if (name.startsWith('xmlns:')) bound.set(name.slice(6), this.tag.value(k));
    }
    this.scope = new Scope(this.scope, bound);
  }

  private nameOf(at: number, nameEnd: number): Name {
    const { last, window } = this;
    if (last && last.scope === this.scope && same(window, at + 1, nameEnd, last.bytes)) return last;
    const bytes = window.slice(at + 1, nameEnd);
    const raw = decode(bytes, 0, bytes.length);
    if (!/^[\p{L}_][\p{L}\p{N}_.\-·]*(:[\p{L}_][\p{L}\p{N}_.\-·]*)?$/u.test(raw)) {
      throw this.refuse(at, `has an element with the name "${raw.slice(0, 40)}"`);
    }
    const colon = bytes.indexOf(COLON);
    const prefix = colon < 0 ? '' : raw.slice(0, raw.indexOf(':'));
    const uri = this.scope.uri(prefix);
    if (uri === undefined) throw this.refuse(at, `uses the prefix "${prefix}" without declaring it`);
    this.last = { bytes, raw, uri, local: raw.slice(raw.indexOf(':') + 1), scope: this.scope };
    return this.last;
  }

  private refuse(at: number, what: string): UnusableInput {
    return new UnusableInput('not_a_mesh', `${this.where} ${what}, at byte ${this.before + at}: it is not well-formed XML; export the 3MF again`); // prettier-ignore
  }

  private cut(what: string): UnusableInput {
    return new UnusableInput('truncated', `${this.where} ends ${what}, at byte ${this.before + this.filled}; upload it again or export it again`); // prettier-ignore
  }
}

function isSpace(byte: number): boolean {
  return byte === 32 || byte === 10 || byte === 13 || byte === 9;
}

function isDelimiter(byte: number): boolean {
  return byte <= 32 || byte === GT || byte === SLASH || byte === LT || byte === QUOTE;
}

function same(bytes: Uint8Array, from: number, to: number, name: Uint8Array): boolean {
  if (to - from !== name.length) return false;
  for (let k = 0; k < name.length; k++) if (bytes[from + k] !== name[k]) return false;
  return true;
}

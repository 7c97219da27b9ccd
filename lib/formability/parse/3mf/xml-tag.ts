const XML_NAMESPACE = 'http://www.w3.org/XML/1998/namespace';

/** Prefixes in scope, innermost first. */
export class Scope {
  constructor(
    private readonly outer: Scope | null,
    private readonly bound: Map<string, string>,
  ) {}

  /** The namespace of a prefix (empty: the default one); undefined where nothing binds it. */
  uri(prefix: string): string | undefined {
    if (prefix === 'xml') return XML_NAMESPACE;
    return this.bound.get(prefix) ?? this.outer?.uri(prefix) ?? (prefix === '' ? '' : undefined);
  }
}

/** A start tag where it lies in the scanner's buffer: valid only while it is handed over. */
export class Tag {
  uri = '';
  local = '';
  count = 0;
  scope: Scope = new Scope(null, new Map());
  /** Four offsets an attribute: name from, name to, value from, value to. */
  private at = new Int32Array(4 * 64);

  constructor(public bytes: Uint8Array) {}

  add(nameFrom: number, nameTo: number, from: number, to: number): void {
    if (4 * this.count === this.at.length) {
      const larger = new Int32Array(2 * this.at.length);
      larger.set(this.at);
      this.at = larger;
    }
    const o = 4 * this.count++;
    this.at[o] = nameFrom;
    this.at[o + 1] = nameTo;
    this.at[o + 2] = from;
    this.at[o + 3] = to;
  }

  from(index: number): number {
    return this.at[4 * index + 2];
  }

  to(index: number): number {
    return this.at[4 * index + 3];
  }

  /** Index of the attribute with this plain name, `hint` tried first; -1 where there is none. */
  find(name: Uint8Array, hint = 0): number {
    if (hint < this.count && this.isNamed(hint, name)) return hint;
    for (let k = 0; k < this.count; k++) if (this.isNamed(k, name)) return k;
    return -1;
  }

  private isNamed(index: number, name: Uint8Array): boolean {
    const from = this.at[4 * index];
    if (this.at[4 * index + 1] - from !== name.length) return false;
    for (let k = 0; k < name.length; k++) if (this.bytes[from + k] !== name[k]) return false;
    return true;
  }

  sameName(one: number, other: number): boolean {
    const [a, b] = [this.at[4 * one], this.at[4 * other]];
    const length = this.at[4 * one + 1] - a;
    if (this.at[4 * other + 1] - b !== length) return false;
    for (let k = 0; k < length; k++) if (this.bytes[a + k] !== this.bytes[b + k]) return false;
    return true;
  }

  name(index: number): string {
    return decode(this.bytes, this.at[4 * index], this.at[4 * index + 1]);
  }

  value(index: number): string {
    return unescape(decode(this.bytes, this.from(index), this.to(index)));
  }

  /** Value of the attribute without a namespace, or null. */
  attribute(local: string): string | null {
    for (let k = 0; k < this.count; k++) if (this.name(k) === local) return this.value(k);
    return null;
  }

  /** Value of the attribute of a namespace, or null. */
  foreign(uri: string, local: string): string | null {
    for (let k = 0; k < this.count; k++) {
      const [prefix, name] = this.name(k).split(':');
      if (name === local && this.scope.uri(prefix) === uri) return this.value(k);
    }
    return null;
  }
}

const decoder = new TextDecoder('utf-8', { ignoreBOM: true });

export function decode(bytes: Uint8Array, from: number, to: number): string {
  return decoder.decode(bytes.subarray(from, to));
}

const NAMED: Record<string, string> = { lt: '<', gt: '>', amp: '&', quot: '"', apos: "'" };
/** The five entities of XML itself, and characters by number; nothing else exists without a DTD. */
export const ENTITY = /^&(?:(lt|gt|amp|quot|apos)|#(\d{1,7})|#x([0-9a-fA-F]{1,6}));$/;

function unescape(text: string): string {
  const flat = text.replace(/[\t\n\r]/g, ' ');
  if (!flat.includes('&')) return flat;
  return flat.replace(/&[^;]*;/g, (entity) => {
    const [, named, decimal, hex] = ENTITY.exec(entity) ?? [];
    if (named) return NAMED[named];
    const code = decimal ? Number(decimal) : parseInt(hex ?? '', 16);
    return code > 0 && code <= 0x10ffff ? String.fromCodePoint(code) : '\ufffd';
  });
}

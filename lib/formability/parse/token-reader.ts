const POWERS = Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));

/** White-space separated words and numbers straight from the bytes, without a string for each number. */
export class TokenReader {
  /** True where the last number was spelt NaN. */
  saidNaN = false;
  private at: number;
  private tokenStart = 0;

  constructor(private readonly bytes: Uint8Array) {
    this.at = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  }

  /** The next word in lower case, cut at 40 letters; empty at the end. */
  word(): string {
    this.nextToken();
    return this.lastText().slice(0, 40).toLowerCase();
  }

  lastText(): string {
    let text = '';
    for (let i = this.tokenStart; i < this.at && text.length < 400; i++)
      text += String.fromCharCode(this.bytes[i]);
    return text;
  }

  ended(): boolean {
    return this.at >= this.bytes.length;
  }

  /** Passes a solid's name: up to the line's end, or to "facet normal" where all stands in one line. */
  skipName(): void {
    const { bytes } = this;
    while (this.at < bytes.length && bytes[this.at] !== 10 && bytes[this.at] !== 13) {
      if ((bytes[this.at] | 32) === 102 && bytes[this.at - 1] <= 32 && this.facetFollows()) return;
      this.at++;
    }
  }

  private facetFollows(): boolean {
    let text = '';
    for (let i = this.at; i < Math.min(this.at + 24, this.bytes.length); i++)
      text += String.fromCharCode(this.bytes[i]);
    return /^facet\s+normal\b/i.test(text);
  }

  /** Counted only when a message needs it. */
  line(): number {
    let lines = 1;
    for (let i = 0; i < this.tokenStart && i < this.bytes.length; i++) if (this.bytes[i] === 10) lines++;
    return lines;
  }

  /**
   * The next number; NaN where there is none. Up to 15 digits and powers within 1e±22 are exact in a double, so
   * one division or product rounds correctly; anything longer goes through the language's own parser.
   */
  number(): number {
    this.nextToken();
    this.saidNaN = false;
    const { bytes } = this;
    const end = this.at;
    let i = this.tokenStart;
    const negative = bytes[i] === 45;
    if (negative || bytes[i] === 43) i++;
    let mantissa = 0;
    let digits = 0;
    let exponent = 0;
    for (; i < end && isDigit(bytes[i]); i++, digits++) mantissa = mantissa * 10 + bytes[i] - 48;
    if (bytes[i] === 46 && i < end) {
      for (i++; i < end && isDigit(bytes[i]); i++, digits++, exponent--)
        mantissa = mantissa * 10 + bytes[i] - 48;
    }
    if (digits === 0) return this.slowNumber();
    if (i < end && (bytes[i] | 32) === 101) {
      i++;
      const sign = bytes[i] === 45 ? -1 : 1;
      if (bytes[i] === 45 || bytes[i] === 43) i++;
      let power = 0;
      const from = i;
      for (; i < end && isDigit(bytes[i]) && power < 10_000; i++) power = power * 10 + bytes[i] - 48;
      if (i === from) return NaN;
      exponent += sign * power;
    }
    if (i !== end || digits > 15 || exponent > 22 || exponent < -22) return this.slowNumber();
    const value = exponent < 0 ? mantissa / POWERS[-exponent] : mantissa * POWERS[exponent];
    return negative ? -value : value;
  }

  private slowNumber(): number {
    const text = this.lastText().toLowerCase();
    if (/^[+-]?(nan|nan\(.*\)|1\.#(qnan|ind|snan).*)$/.test(text)) {
      this.saidNaN = true;
      return NaN;
    }
    if (/^[+-]?(inf|infinity|1\.#inf.*)$/.test(text)) return text.startsWith('-') ? -Infinity : Infinity;
    return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/.test(text) ? Number(text) : NaN;
  }

  private nextToken(): void {
    const { bytes } = this;
    while (this.at < bytes.length && bytes[this.at] <= 32) this.at++;
    this.tokenStart = this.at;
    while (this.at < bytes.length && bytes[this.at] > 32) this.at++;
  }
}

function isDigit(byte: number): boolean {
  return byte >= 48 && byte <= 57;
}

import { parseNumber, readDecimal } from './decimal';

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

  /** The next number; NaN where there is none, and `saidNaN` where it was spelt so. */
  number(): number {
    this.nextToken();
    this.saidNaN = false;
    const value = readDecimal(this.bytes, this.tokenStart, this.at);
    if (!Number.isNaN(value)) return value;
    const slow = parseNumber(this.lastText());
    this.saidNaN = Number.isNaN(slow);
    return slow ?? NaN;
  }

  private nextToken(): void {
    const { bytes } = this;
    while (this.at < bytes.length && bytes[this.at] <= 32) this.at++;
    this.tokenStart = this.at;
    while (this.at < bytes.length && bytes[this.at] > 32) this.at++;
  }
}

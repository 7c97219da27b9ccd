const POWERS = Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));
const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/** Digits that are taken; what follows changes a double by less than its last bit. */
const DIGITS = 18;

/**
 * The plain decimal number in `bytes[start, end)`; NaN where it is none, or one that takes the slow way (powers beyond
 * 1e±22). Up to 15 digits are exact in a double, so one division or product rounds correctly; more, as doubles are
 * written, come within 1e-15 of the number, far below the float32 that it becomes.
 */
export function readDecimal(bytes: Uint8Array, start: number, end: number): number {
  let i = start;
  const negative = bytes[i] === 45;
  if (negative || bytes[i] === 43) i++;
  let mantissa = 0;
  let digits = 0;
  let exponent = 0;
  const whole = i;
  for (; i < end && isDigit(bytes[i]); i++) {
    if (digits === DIGITS) exponent++;
    else if ((mantissa = mantissa * 10 + bytes[i] - 48) > 0) digits++;
  }
  let count = i - whole;
  if (bytes[i] === 46 && i < end) {
    const fraction = ++i;
    for (; i < end && isDigit(bytes[i]); i++) {
      if (digits === DIGITS) continue;
      exponent--;
      if ((mantissa = mantissa * 10 + bytes[i] - 48) > 0) digits++;
    }
    count += i - fraction;
  }
  if (count === 0) return NaN;
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
  if (i !== end || exponent > 22 || exponent < -22) return NaN;
  const value = exponent < 0 ? mantissa / POWERS[-exponent] : mantissa * POWERS[exponent];
  return negative ? -value : value;
}

/** The same through the language's own parser: any length; null where the text is no number, NaN where it says so. */
export function parseNumber(given: string): number | null {
  const text = given.toLowerCase();
  if (NUMBER.test(text)) return Number(text);
  if (/^[+-]?(nan|nan\(.*\)|1\.#(qnan|ind|snan).*)$/.test(text)) return NaN;
  if (/^[+-]?(inf|infinity|1\.#inf.*)$/.test(text)) return text.startsWith('-') ? -Infinity : Infinity;
  return null;
}

function isDigit(byte: number): boolean {
  return byte >= 48 && byte <= 57;
}

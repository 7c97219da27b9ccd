/** Why an input cannot be used at all (exit code 2 of the command line). */
export type UnusableCode =
  | 'empty'
  | 'truncated'
  | 'no_triangles'
  | 'count_mismatch'
  | 'non_finite'
  | 'out_of_range'
  | 'not_a_mesh'
  | 'unsupported'
  | 'too_large_file'
  | 'invalid_recipe'
  | 'stopped';

/** Control characters, line ends, and those that turn the direction of writing. */
const UNPRINTABLE = /[\u0000-\u001f\u007f-\u009f\u2028-\u202e\u2066-\u2069]+/g;

/** Half of a surrogate pair by itself, as a cut through an emoji leaves it: no JSON store takes it. */
const LONE_SURROGATE = /\p{Surrogate}/gu;
const wellFormed = (text: string) => text.replace(LONE_SURROGATE, '\ufffd');

/**
 * Thrown for input that no report can be made of. `message` is one line, whatever the file put into it: what, where,
 * what to do; `reasons` holds the single facts behind it. Both are well-formed Unicode.
 */
export class UnusableInput extends Error {
  readonly code: UnusableCode;
  readonly reasons: string[];

  constructor(code: UnusableCode, message: string, reasons: string[] = []) {
    super(wellFormed(message.replace(UNPRINTABLE, ' ')));
    this.name = 'UnusableInput';
    this.code = code;
    this.reasons = reasons.map(wellFormed);
  }
}

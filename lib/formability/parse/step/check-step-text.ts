import { UnusableInput } from '../../unusable-input';

const EDGE = 65_536;

/**
 * What can be told of a STEP file without its entities: whether its end is there, and that it is no building model,
 * which is written in the same way.
 * @throws UnusableInput truncated, unsupported
 */
export function checkStepText(bytes: Uint8Array): void {
  const latin = new TextDecoder('latin1');
  const tail = latin.decode(bytes.subarray(Math.max(0, bytes.length - EDGE)));
  if (!/END-ISO-10303-21\s*;/.test(tail)) {
    throw new UnusableInput('truncated', `the STEP file ends after ${bytes.length} bytes without END-ISO-10303-21; upload it again or export it again`); // prettier-ignore
  }
  const schema = /FILE_SCHEMA\s*\(\s*\(\s*'([^']*)'/i.exec(latin.decode(bytes.subarray(0, EDGE)))?.[1] ?? '';
  if (/^IFC/i.test(schema)) {
    throw new UnusableInput('unsupported', `the file is a building model (${schema.slice(0, 40)}), not a part; export the template as STEP AP203, AP214 or AP242`); // prettier-ignore
  }
}

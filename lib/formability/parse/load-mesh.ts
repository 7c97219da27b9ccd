import { MAX_STEP_BYTES } from './size-caps';
import type { RawMesh } from './raw-mesh';
import { readMesh } from './read-mesh';
import { isStep } from './sniff-format';
import { convertStep, type ConvertLimits } from './step/convert-step';
import { UnusableInput } from '../unusable-input';

export interface LoadOptions extends ConvertLimits {
  /** Aborting ends a conversion under way at once, with UnusableInput `stopped`. */
  signal?: AbortSignal;
}

/**
 * Reads a file of any format that is taken: STL and 3MF here, STEP in a process of its own.
 * @throws UnusableInput with the code, the place and what to do
 */
export async function loadMesh(bytes: Uint8Array, options: LoadOptions = {}): Promise<RawMesh> {
  if (!isStep(bytes)) return readMesh(bytes);
  if (bytes.length > MAX_STEP_BYTES) {
    throw new UnusableInput('too_large_file', `the STEP file has ${bytes.length} bytes, more than the ${MAX_STEP_BYTES} that are converted; export the template alone, or as 3MF or STL`); // prettier-ignore
  }
  return convertStep(bytes, options);
}

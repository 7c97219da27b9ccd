import { UnusableInput } from '../../unusable-input';
import type { RawMesh } from '../raw-mesh';
import { MAX_TRIANGLES } from '../size-caps';
import { checkStepText } from './check-step-text';
import { runConverter, type ConverterLimits } from './run-converter';

export interface ConvertLimits {
  /** Longest conversion, in milliseconds. */
  stepWallMs?: number;
  /** Most memory of the converting process, in megabytes. */
  stepMemoryMb?: number;
  /** Most solids and shells of one file. */
  stepBodies?: number;
}

/**
 * How fine curved surfaces are cut: a share of the mean side of the box, within absolute bounds, and never more than
 * this angle between neighbouring facets. 0.02 % is 0.04 mm on a template of 300 × 200 × 60 mm, a quarter of a printed
 * layer (common practice, no source).
 */
const FINENESS = { sizeShare: 2e-4, finestMm: 0.005, coarsestMm: 0.05, angularDeg: 12 };

/**
 * Converts a STEP file (ISO 10303-21; application protocols 203, 214, 242) to triangles in millimetres, whatever the
 * file's own unit, with occt-import-js in a process of its own, which is ended at its limits of time and memory.
 * @throws UnusableInput truncated, no_triangles, not_a_mesh, unsupported, too_large_file, stopped
 */
export async function convertStep(
  bytes: Uint8Array,
  {
    stepWallMs = 120_000,
    stepMemoryMb = 3_000,
    stepBodies = 500,
    signal,
  }: ConvertLimits & { signal?: AbortSignal } = {},
): Promise<RawMesh> {
  checkStepText(bytes);
  const limits: ConverterLimits = {
    wallMs: stepWallMs,
    memoryMb: stepMemoryMb,
    heapMb: Math.round(stepMemoryMb / 2),
    bodies: stepBodies,
    triangles: MAX_TRIANGLES,
    ...FINENESS,
  };
  const converted = await runConverter(bytes, limits, signal);
  if (!converted.ok) throw explain(converted, limits);
  const { coords, triangles, bodies, deflectionMm } = converted;
  return { format: 'step', unit: 'mm', triangles, coords, warnings: [], bodies, deflectionMm };
}

interface Failure {
  failed: string;
  why?: string;
  bodies?: number;
  triangles?: number;
}

function explain({ failed, why, bodies, triangles }: Failure, limits: ConverterLimits): UnusableInput {
  switch (failed) {
    case 'stopped':
      return new UnusableInput('stopped', 'the run was stopped while the STEP file was converted; start it again'); // prettier-ignore
    case 'nothing':
      return new UnusableInput('no_triangles', 'the STEP file holds no surface: it is empty, or an assembly whose parts lie in other files; export the template itself as one part'); // prettier-ignore
    case 'bodies':
      return new UnusableInput('unsupported', `the STEP file is an assembly of ${bodies} bodies, more than the ${limits.bodies} that are taken; export the template alone`); // prettier-ignore
    case 'triangles':
      return new UnusableInput('too_large_file', `the STEP file makes ${triangles} facets, more than the ${limits.triangles} that are read; leave out threads, textures and lettering, or export STL with a coarser tolerance`); // prettier-ignore
    case 'too-slow':
      return new UnusableInput('too_large_file', `the STEP file took more than ${limits.wallMs / 1000} s to convert and was given up; simplify it, or export 3MF or STL`); // prettier-ignore
    case 'too-much-memory':
      return new UnusableInput('too_large_file', `the STEP file needs more than ${limits.memoryMb} MB to convert and was given up; simplify it, or export 3MF or STL`); // prettier-ignore
    case 'unreadable':
      return new UnusableInput('not_a_mesh', 'the STEP file cannot be read: its entities do not make up a shape; export it again as AP203, AP214 or AP242, or as 3MF or STL'); // prettier-ignore
    default:
      return new UnusableInput('unsupported', `the STEP file breaks the conversion${why ? ` (${why})` : ''}; export it again as AP214 or AP242, or as 3MF or STL`); // prettier-ignore
  }
}

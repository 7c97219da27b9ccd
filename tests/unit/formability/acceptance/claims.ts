import { expect } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { CheckId, CheckStatus, Report } from '@/lib/formability/report';
import type { Triangles } from '../../../fixtures/meshes/triangles';
import { binaryStl } from '../../../fixtures/meshes/write-stl';

/** A figure with the tolerance it is held to. */
class Within {
  constructor(
    readonly value: number,
    readonly tolerance: number,
    readonly relative: boolean,
  ) {}

  holds(found: unknown): boolean {
    if (typeof found !== 'number' || !Number.isFinite(found)) return false;
    const allowed = this.relative ? Math.abs(this.value) * this.tolerance : this.tolerance;
    return Math.abs(found - this.value) <= allowed;
  }

  toString(): string {
    return this.relative ? `${this.value} ± ${this.tolerance * 100} %` : `${this.value} ± ${this.tolerance}`;
  }
}

/** Holds within a share of the value. */
export const rel = (value: number, share: number) => new Within(value, share, true);
/** Holds within a distance. */
export const abs = (value: number, distance: number) => new Within(value, distance, false);
/** Exact arithmetic, in float32 coordinates: volumes and areas to 1e-5. */
export const tight = (value: number) =>
  value === 0 ? new Within(0, 1e-9, false) : new Within(value, 1e-5, true);

class Having {
  constructor(
    readonly words: readonly string[],
    readonly wanted: boolean,
  ) {}
}

/** A list that holds these among others. */
export const has = (...words: string[]) => new Having(words, true);
/** A list that holds none of these. */
export const lacks = (...words: string[]) => new Having(words, false);

export type Claim = unknown;
export type Claims = Record<string, Claim>;

export function lookUp(report: unknown, path: string): unknown {
  return path
    .split('.')
    .reduce<unknown>(
      (at, key) => (at === null || at === undefined ? at : (at as Record<string, unknown>)[key]),
      report,
    );
}

/** Every claim that the report does not bear out, as "path: expected …, got …". */
export function missesOf(report: unknown, claims: Claims): string[] {
  return Object.entries(claims).flatMap(([path, claim]) => missOf(path, lookUp(report, path), claim));
}

function missOf(path: string, found: unknown, claim: Claim): string[] {
  const told = (expected: string) => [
    `${path}: expected ${expected}, got ${JSON.stringify(found)?.slice(0, 300)}`,
  ];
  if (claim instanceof Within) return claim.holds(found) ? [] : told(claim.toString());
  if (claim instanceof Having) {
    const list = Array.isArray(found) ? (found as string[]) : [];
    const right = claim.words.every((word) => list.includes(word) === claim.wanted);
    return right ? [] : told(`${claim.wanted ? '' : 'no '}${claim.words.join(', ')}`);
  }
  if (Array.isArray(claim)) {
    if (!Array.isArray(found) || found.length !== claim.length) return told(`${claim.length} entries`);
    return claim.flatMap((one, i) => missOf(`${path}.${i}`, found[i], one));
  }
  if (typeof claim === 'function') {
    const why = (claim as (value: unknown) => string | null)(found);
    return why === null ? [] : told(why);
  }
  return Object.is(found, claim) || found === claim ? [] : told(JSON.stringify(claim));
}

/** The report; its geometric half alone unless the whole is asked for. */
export function analysed(mesh: Triangles | Uint8Array, recipe: RecipeInput = {}, whole = false): Report {
  const bytes = mesh instanceof Uint8Array ? mesh : binaryStl(mesh);
  return analyse(bytes, recipe, { geometryOnly: !whole }).report;
}

/** Holds a mesh's report against what was worked out for it; every miss is told at once. */
export function hold(
  mesh: Triangles | Uint8Array,
  claims: Claims,
  recipe: RecipeInput = {},
  whole = false,
): Report {
  const report = analysed(mesh, recipe, whole);
  expect(missesOf(report, claims)).toEqual([]);
  return report;
}

/** Checks held to a status, or to one of several ("caution|fail"). */
export function holdChecks(
  report: Report,
  wanted: Partial<Record<CheckId, CheckStatus | 'caution|fail'>>,
): void {
  const found = Object.keys(wanted).map((id) => {
    const status = report.checks.find((check) => check.id === id)?.status;
    return `${id} ${status}`;
  });
  const expected = Object.entries(wanted).map(([id, status], i) => {
    const [, got] = found[i].split(' ');
    return `${id} ${status.split('|').includes(got) ? got : status}`;
  });
  expect(found).toEqual(expected);
}

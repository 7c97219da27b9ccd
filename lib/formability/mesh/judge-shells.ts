import type { Columns } from '../dexel/columns';
import type { MeshPlace, MeshWarning } from '../report';
import { buildEdges } from './build-edges';
import { boxesMeet, chooseCandidates, type Candidates } from './choose-candidates';
import { dropFacets } from './drop-facets';
import { shellBoxes } from './facet-boxes';
import { findFloating } from './find-floating';
import { findMeetings, pairKey, type MeetingList } from './find-meetings';
import { findOpposed } from './find-opposed';
import { findShells, type Shells } from './find-shells';
import { gatherPlaces, gatherPoints, placesOfBoxes } from './gather-places';
import { measureUnion, type Union } from './measure-union';
import type { Mesh } from './mesh';
import { perturbMesh, SHELL_SHIFT } from './perturb-mesh';
import type { Prepared } from './prepare-mesh';
import { signedVolume } from './signed-volume';

/** Fewer columns than this share that look doubly covered are grazing noise. */
const STRAY_COLUMNS = 1e-4;
/** Grid error of a volume by columns, as a share. */
const COLUMNS_AGREE = 0.01;

/** How the shells lie to one another, and what volume they fill together. */
export interface ShellJudgement {
  unionVolumeMm3: number;
  warnings: MeshWarning[];
  places: MeshPlace[];
}

/**
 * Crossings, contacts, bodies in the air, and the union's volume: exact where the surface is closed (measure-union),
 * from the columns where it is not, or where it crosses itself more often than can be followed.
 */
export function judgeShells(prepared: Prepared, columns: Columns): ShellJudgement {
  const { mesh, shells, edges, toleranceMm: tolerance } = prepared;
  const boxes = shells.count > 1 ? shellBoxes(mesh.index, mesh.position, shells.ofFacet, shells.count) : null;
  const candidates = chooseCandidates(mesh, shells, edges, boxes, columns, tolerance);
  const meetings = findMeetings(mesh, shells, candidates, tolerance, edges.nonManifold > 0);
  const opposed = findOpposed(mesh.index, edges, mesh.vertices);
  const covered = columns.count.reduce((sum, n) => sum + (n > 0 ? 1 : 0), 0);
  const odd = columns.overlapColumns > Math.max(2, STRAY_COLUMNS * covered);
  const doubtful = odd || meetings.own.at.length > 0 || (boxes !== null && boxesMeet(boxes, tolerance));
  const { capped } = prepared;
  const signed = signedVolume(capped.mesh, 0, 0);
  const exact =
    capped.sealed && doubtful && candidates.complete ? uniteExactly(prepared, candidates, opposed) : null;
  // Where shells were not looked at in themselves, the columns must bear the result out.
  const borne = !candidates.apart || exact === null || agree(exact.volumeMm3, columns.solidVolume);
  const union = borne ? exact : null;
  const slop = 4 * SHELL_SHIFT * sizeOf(prepared) * (union?.cutAreaMm2 ?? 0) + 1e-9 * Math.abs(signed);
  const differs = union !== null && Math.abs(signed - union.volumeMm3) > slop;
  const excess = union === null ? odd : differs && signed > union.volumeMm3;

  const warnings: MeshWarning[] = [];
  const places: MeshPlace[] = [];
  const say = (code: MeshWarning, found: MeshPlace[]) => {
    warnings.push(code);
    places.push(...found);
  };
  const crossing = meetings.own.at.length > 0;
  const between = meetings.between.at.length > 0;
  // Bodies that share planes overlap without any facet going through another: their contacts then tell the place.
  const flush = excess && boxes ? takeThick(meetings.touching, shells, boxes, tolerance) : null;
  if (crossing || (excess && shells.count === 1))
    say('self_intersection', crossingPlaces(mesh, sizeOf(prepared), meetings.own));
  if (between || (excess && shells.count > 1 && !crossing)) {
    const found = pairPlaces(
      'overlapping_shells',
      mesh,
      shells,
      between || !flush ? meetings.between : flush.thick,
    );
    const inner = opposed === null && capped.mesh === mesh ? (union?.covered ?? []) : [];
    say('overlapping_shells', found.length > 0 ? found : innerPlaces(mesh, inner));
  }
  const touching = flush ? flush.thin : meetings.touching;
  if (touching.at.length > 0) say('touching_shells', pairPlaces('touching_shells', mesh, shells, touching));
  const floating = boxes ? findFloating(mesh, shells, boxes, meetings, tolerance) : [];
  if (floating.length > 0 && boxes) say('floating', placesOfBoxes('floating', boxes, floating, mesh.centre));
  return {
    unionVolumeMm3: volumeOf(columns, {
      sealed: capped.sealed,
      signed,
      union: differs ? union : null,
      odd: odd && union === null,
    }),
    warnings,
    places,
  };
}

/** Contacts parted into those of shells whose boxes share room, and those whose boxes merely meet. */
function takeThick(
  list: MeetingList,
  shells: Shells,
  boxes: Float64Array,
  tolerance: number,
): { thick: MeetingList; thin: MeetingList } {
  const thick: MeetingList = { facets: [], at: [] };
  const thin: MeetingList = { facets: [], at: [] };
  for (let i = 0; 2 * i < list.facets.length; i++) {
    const [f, g] = [list.facets[2 * i], list.facets[2 * i + 1]];
    const [s, t] = [6 * shells.ofFacet[f], 6 * shells.ofFacet[g]];
    let room = s !== t;
    for (let k = 0; k < 3; k++) {
      const shared = Math.min(boxes[s + 3 + k], boxes[t + 3 + k]) - Math.max(boxes[s + k], boxes[t + k]);
      if (shared <= 2 * tolerance) room = false;
    }
    const into = room ? thick : thin;
    into.facets.push(f, g);
    into.at.push(list.at[3 * i], list.at[3 * i + 1], list.at[3 * i + 2]);
  }
  return { thick, thin };
}

function uniteExactly(
  prepared: Prepared,
  { facets, apart }: Candidates,
  opposed: Uint8Array | null,
): Union | null {
  const { mesh, shells, edges, capped } = prepared;
  const size = sizeOf(prepared);
  if (opposed === null && capped.mesh === mesh) {
    return measureUnion(
      mesh.index,
      mesh.position,
      perturbMesh(mesh, shells, size),
      edges,
      facets,
      apart ? (t) => shells.ofFacet[t] : undefined,
    );
  }
  const { index, position, vertices } = capped.mesh;
  const marks = new Uint8Array(capped.mesh.triangles);
  if (opposed) marks.set(opposed);
  const kept = dropFacets(index.slice(), marks);
  const inner: Mesh = { ...capped.mesh, index: kept, triangles: kept.length / 3 };
  const moved = perturbMesh(inner, findShells(kept, vertices), size);
  const all = Uint32Array.from({ length: inner.triangles }, (_, t) => t);
  return measureUnion(kept, position, moved, buildEdges(kept, vertices), all);
}

function volumeOf(
  columns: Columns,
  { sealed, signed, union, odd }: { sealed: boolean; signed: number; union: Union | null; odd: boolean },
): number {
  if (!sealed) return columns.solidVolume;
  if (union === null) return odd ? signed - columns.excessVolume : signed;
  return union.volumeMm3;
}

function agree(one: number, other: number): boolean {
  return Math.abs(one - other) <= COLUMNS_AGREE * Math.abs(other);
}

function sizeOf({ min, max }: Pick<Prepared, 'min' | 'max'>): number {
  return Math.hypot(...max.map((high, k) => high - min[k]));
}

/** Crossings within a shell, gathered over a twentieth of the part. */
function crossingPlaces(mesh: Mesh, size: number, { at }: MeetingList): MeshPlace[] {
  const cell = (i: number) => [0, 1, 2].map((k) => Math.floor((20 * at[3 * i + k]) / size + 0.137)).join();
  return gatherPoints('self_intersection', at, mesh.centre, cell);
}

/** Crossings and contacts of two shells are one place. */
function pairPlaces(
  code: MeshWarning,
  mesh: Mesh,
  { ofFacet, count }: Shells,
  list: MeetingList,
): MeshPlace[] {
  const pair = (i: number) => pairKey(ofFacet[list.facets[2 * i]], ofFacet[list.facets[2 * i + 1]], count);
  return gatherPoints(code, list.at, mesh.centre, pair);
}

/** A body within another meets it nowhere: its own facets are the place. */
function innerPlaces(mesh: Mesh, facets: number[]): MeshPlace[] {
  const marks = new Uint8Array(mesh.triangles);
  for (const t of facets) marks[t] = 1;
  return gatherPlaces('overlapping_shells', mesh.position, mesh.centre, facetCorners(mesh, marks), 3);
}

function facetCorners(mesh: Mesh, marks: Uint8Array): number[] {
  const corners: number[] = [];
  for (let t = 0; t < marks.length; t++) {
    if (marks[t]) corners.push(mesh.index[3 * t], mesh.index[3 * t + 1], mesh.index[3 * t + 2]);
  }
  return corners;
}

import { DoubleSide, BufferAttribute, BufferGeometry, Ray, Vector3 } from 'three';
import { MeshBVH } from 'three-mesh-bvh';
import { FLAG_BED, FLAG_UNDERCUT, FLAG_UNVENTED } from '@/lib/stage-model/stage-model-meta';
import { rigAxes, type RigState } from './camera-rig';
import { NO_TRAP_MM, type StageModelData } from './decode-stage-model';
import type { Point } from './stage-props';

/** What the stage knows of a place on the surface. */
export interface SurfaceHit {
  at: Point;
  normal: Point;
  draftDeg: number;
  undercut: boolean;
  bed: boolean;
  /** null where none was measured */
  wallMm: number | null;
  /** thickness of the formed sheet; null where it does not reach, or no sheet is there */
  sheetMm: number | null;
  /** below the rim that the pocket fills to; null outside of pockets and above the rim */
  trapMm: number | null;
  /** in a pocket that no vent leads out of */
  unvented: boolean;
}

export interface StageSize {
  width: number;
  height: number;
}

/** Where a point appears, CSS pixels from the top left of a stage of this size. */
export function toScreen(at: Point, rig: RigState, { width, height }: StageSize): [number, number] {
  const { right, up } = rigAxes(rig);
  const pxPerMm = height / rig.span;
  const d = at.map((v, a) => v - rig.target[a]);
  const along = (axis: Point) => d[0] * axis[0] + d[1] * axis[1] + d[2] * axis[2];
  return [width / 2 + along(right) * pxPerMm, height / 2 - along(up) * pxPerMm];
}

/** Finds the surface under a place of the stage, by the search tree that came with the model; needs no WebGL. */
export class SurfacePicker {
  private readonly tree: MeshBVH;
  private readonly reach: number;
  private sheetAt: (at: Point) => number | null = () => null;

  constructor(private readonly model: StageModelData) {
    const geometry = new BufferGeometry();
    geometry.setAttribute('position', new BufferAttribute(model.positions, 3));
    geometry.setIndex(new BufferAttribute(model.index, 1));
    this.tree = MeshBVH.deserialize({ ...model.tree, index: model.index }, geometry, { setIndex: false });
    geometry.computeBoundingSphere();
    this.reach = (geometry.boundingSphere?.radius ?? 100) * 4;
  }

  /** What tells the formed sheet's thickness at a place of the surface, mm; null where it does not reach. */
  setSheet(sheetAt: ((at: Point) => number | null) | null): void {
    this.sheetAt = sheetAt ?? (() => null);
  }

  /** The surface under a place (CSS pixels from the top left), or null where there is only paper. */
  pick(x: number, y: number, rig: RigState, size: StageSize): SurfaceHit | null {
    const { right, up, toEye } = rigAxes(rig);
    const mmPerPx = rig.span / size.height;
    const [u, v] = [(x - size.width / 2) * mmPerPx, (size.height / 2 - y) * mmPerPx];
    const origin = rig.target.map((t, a) => t + right[a] * u + up[a] * v + toEye[a] * this.reach) as Point;
    return this.cast(origin, toEye.map((c) => -c) as Point);
  }

  /** True when something of the template stands between the eye and a point on its surface. */
  isHidden(at: Point, rig: RigState): boolean {
    const { toEye } = rigAxes(rig);
    const clear = this.reach / 4000;
    return this.cast(at.map((v, a) => v + toEye[a] * clear) as Point, toEye) !== null;
  }

  private cast(origin: Point, direction: Point): SurfaceHit | null {
    const hit = this.tree.raycastFirst(
      new Ray(new Vector3(...origin), new Vector3(...direction)),
      DoubleSide,
    );
    if (!hit || hit.faceIndex == null || !hit.face) return null;
    const corners = [0, 1, 2].map((k) => this.model.index[hit.faceIndex! * 3 + k]);
    const weights = this.weights(hit.point, corners);
    const draftDeg = corners.reduce((sum, v, k) => sum + this.model.draftDeg[v] * weights[k], 0);
    const flags = this.model.flags[corners[0]];
    const normal = hit.face.normal;
    return {
      at: hit.point.toArray() as Point,
      normal: normal.toArray() as Point,
      draftDeg,
      undercut: (flags & FLAG_UNDERCUT) !== 0,
      bed: (flags & FLAG_BED) !== 0,
      wallMm: known(this.model.wallMm, corners, weights, 0),
      sheetMm: flags & (FLAG_BED | FLAG_UNDERCUT) ? null : this.sheetAt(hit.point.toArray() as Point),
      trapMm: positive(known(this.model.trapMm, corners, weights, NO_TRAP_MM)),
      unvented: (flags & FLAG_UNVENTED) !== 0,
    };
  }

  private weights(point: Vector3, corners: number[]): number[] {
    const [a, b, c] = corners.map((v) => new Vector3().fromArray(this.model.positions, v * 3));
    const whole = b.clone().sub(a).cross(c.clone().sub(a)).length() || 1;
    const part = (p: Vector3, q: Vector3) =>
      p.clone().sub(point).cross(q.clone().sub(point)).length() / whole;
    const [wa, wb] = [part(b, c), part(c, a)];
    return [wa, wb, Math.max(0, 1 - wa - wb)];
  }
}

/** The figure between corners that have one (above `none`); null where they weigh less than those without. */
function known(
  figures: Float32Array | null,
  corners: number[],
  weights: number[],
  none: number,
): number | null {
  let [sum, weight] = [0, 0];
  corners.forEach((v, k) => {
    if (!figures || figures[v] <= none) return;
    sum += figures[v] * weights[k];
    weight += weights[k];
  });
  return weight > 0.5 ? sum / weight : null;
}

function positive(figure: number | null): number | null {
  return figure !== null && figure > 0 ? figure : null;
}

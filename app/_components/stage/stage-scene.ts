import {
  BufferAttribute,
  BufferGeometry,
  Color,
  LineBasicMaterial,
  LineSegments,
  Mesh,
  OrthographicCamera,
  Ray,
  Scene,
  Vector3,
  WebGLRenderer,
} from 'three';
import { MeshBVH } from 'three-mesh-bvh';
import { rigAxes, type RigState } from './camera-rig';
import type { StageModelData } from './decode-stage-model';
import type { Point, StageMap } from './stage-props';
import { createTemplateMaterial, type StageColours } from './template-material';

/** What the stage knows of a place on the surface. */
export interface SurfaceHit {
  at: Point;
  normal: Point;
  draftDeg: number;
  undercut: boolean;
  bed: boolean;
}

const HATCH_CSS_PX = 7;
const MOST_PIXEL_RATIO = 2;
/** A frame that takes longer than this while the eye moves is drawn coarser until it rests. */
const SLOW_FRAME_MS = 32;

/**
 * Draws one stage model; knows nothing of React. Draws only when told to: there is no loop that runs at rest.
 * Throws when the browser gives no WebGL context.
 */
export class StageScene {
  private readonly renderer: WebGLRenderer;
  private readonly scene = new Scene();
  private readonly camera = new OrthographicCamera();
  private readonly template = createTemplateMaterial();
  private readonly inkMaterial = new LineBasicMaterial({ transparent: true, opacity: 0.55 });
  private readonly cutMaterial = new LineBasicMaterial();
  private readonly surface = new BufferGeometry();
  private readonly ink = new BufferGeometry();
  private readonly cut = new BufferGeometry();
  private readonly cutLines: LineSegments;
  private readonly tree: MeshBVH;
  private readonly reach: number;
  private coarse = 1;
  private probe = 0;
  private size = { width: 1, height: 1 };

  constructor(
    readonly canvas: HTMLCanvasElement,
    private readonly model: StageModelData,
  ) {
    this.renderer = new WebGLRenderer({ canvas, antialias: true, alpha: true });
    this.renderer.setClearAlpha(0);
    const position = new BufferAttribute(model.positions, 3);
    this.surface.setAttribute('position', position);
    this.surface.setAttribute('normal', new BufferAttribute(model.normals, 3));
    this.surface.setAttribute('draft', new BufferAttribute(model.draftDeg, 1));
    this.surface.setAttribute('flags', new BufferAttribute(model.flags, 1));
    this.surface.setIndex(new BufferAttribute(model.index, 1));
    this.tree = MeshBVH.deserialize({ ...model.tree, index: model.index }, this.surface, { setIndex: false });
    this.surface.computeBoundingSphere();
    this.reach = (this.surface.boundingSphere?.radius ?? 100) * 4;
    this.ink.setAttribute('position', position);
    this.ink.setIndex(new BufferAttribute(model.lines, 1));
    this.cutLines = new LineSegments(this.cut, this.cutMaterial);
    this.cutLines.frustumCulled = false;
    const inkLines = new LineSegments(this.ink, this.inkMaterial);
    this.scene.add(new Mesh(this.surface, this.template.material), inkLines, this.cutLines);
  }

  resize(width: number, height: number): void {
    this.size = { width: Math.max(1, width), height: Math.max(1, height) };
    this.renderer.setSize(this.size.width, this.size.height, false);
  }

  setMap(map: StageMap): void {
    this.template.setMap(map);
  }

  setLimit(deg: number): void {
    this.template.setLimit(deg);
  }

  setColours(colours: StageColours): void {
    this.template.setColours(colours);
    this.inkMaterial.color = new Color(colours.ink);
    this.cutMaterial.color = new Color(colours.ink);
  }

  /** Pairs of points, mm: the trace of the cut on the surface. */
  setCut(points: Float32Array): void {
    this.cut.setAttribute('position', new BufferAttribute(points, 3));
    this.cutLines.visible = points.length > 0;
  }

  /** Draws one frame; `moving` allows a coarser one on a slow machine. */
  draw(rig: RigState, moving: boolean): void {
    const ratio = Math.min(MOST_PIXEL_RATIO, window.devicePixelRatio || 1) * (moving ? this.coarse : 1);
    if (this.renderer.getPixelRatio() !== ratio) this.renderer.setPixelRatio(ratio);
    this.template.setPitch(HATCH_CSS_PX * ratio);
    this.inkMaterial.opacity = ratio > 1.5 ? 0.8 : 0.5;
    this.aim(rig);
    this.renderer.render(this.scene, this.camera);
  }

  /** Call after a frame drawn in motion: where the next chance to draw comes late, later frames are drawn coarser. */
  timeFrame(): void {
    if (this.probe !== 0) return;
    const start = performance.now();
    this.probe = requestAnimationFrame(() => {
      this.probe = requestAnimationFrame(() => {
        this.probe = 0;
        const spent = (performance.now() - start) / 2;
        if (spent > SLOW_FRAME_MS) this.coarse = Math.max(0.4, this.coarse * 0.8);
        else if (spent < SLOW_FRAME_MS * 0.6) this.coarse = Math.min(1, this.coarse * 1.1);
      });
    });
  }

  private aim(rig: RigState): void {
    const { right, up, toEye } = rigAxes(rig);
    const half = rig.span / 2;
    const aspect = this.size.width / this.size.height;
    this.camera.top = half;
    this.camera.bottom = -half;
    this.camera.right = half * aspect;
    this.camera.left = -half * aspect;
    this.camera.near = 0;
    this.camera.far = this.reach * 2;
    this.camera.up.set(...up);
    this.camera.position.set(...rig.target).addScaledVector(new Vector3(...toEye), this.reach);
    this.camera.lookAt(new Vector3(...rig.target));
    this.camera.updateProjectionMatrix();
    this.camera.updateMatrixWorld();
    this.template.setEye(right, toEye);
  }

  /** Where a point appears, CSS pixels from the top left of the canvas. */
  toScreen(at: Point, rig: RigState): [number, number] {
    const { right, up } = rigAxes(rig);
    const pxPerMm = this.size.height / rig.span;
    const d = at.map((v, a) => v - rig.target[a]);
    const along = (axis: Point) => d[0] * axis[0] + d[1] * axis[1] + d[2] * axis[2];
    return [this.size.width / 2 + along(right) * pxPerMm, this.size.height / 2 - along(up) * pxPerMm];
  }

  /** The surface under a place of the canvas, or null where there is only paper. */
  pick(x: number, y: number, rig: RigState): SurfaceHit | null {
    const { right, up, toEye } = rigAxes(rig);
    const mmPerPx = rig.span / this.size.height;
    const [u, v] = [(x - this.size.width / 2) * mmPerPx, (this.size.height / 2 - y) * mmPerPx];
    const origin = rig.target.map((t, a) => t + right[a] * u + up[a] * v + toEye[a] * this.reach) as Point;
    return this.cast(origin, toEye.map((c) => -c) as Point);
  }

  /** True when something of the template stands between the eye and a point on its surface. */
  isHidden(at: Point, rig: RigState): boolean {
    const { toEye } = rigAxes(rig);
    const clear = this.reach / 4000;
    const hit = this.cast(at.map((v, a) => v + toEye[a] * clear) as Point, toEye);
    return hit !== null;
  }

  private cast(origin: Point, direction: Point): SurfaceHit | null {
    const hit = this.tree.raycastFirst(
      new Ray(new Vector3(...origin), new Vector3(...direction)),
      this.template.material.side,
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
      undercut: flags > 1.5,
      bed: flags % 2 === 1,
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

  dispose(): void {
    cancelAnimationFrame(this.probe);
    for (const geometry of [this.surface, this.ink, this.cut]) geometry.dispose();
    this.template.dispose();
    this.inkMaterial.dispose();
    this.cutMaterial.dispose();
    this.renderer.dispose();
    this.renderer.forceContextLoss();
  }
}

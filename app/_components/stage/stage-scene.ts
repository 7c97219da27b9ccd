import {
  BufferAttribute,
  BufferGeometry,
  Color,
  LineBasicMaterial,
  LineSegments,
  Mesh,
  OrthographicCamera,
  Scene,
  Vector3,
  WebGLRenderer,
} from 'three';
import { rigAxes, type RigState } from './camera-rig';
import type { SheetModelData } from './decode-sheet-model';
import type { StageModelData } from './decode-stage-model';
import { probeWebgl } from './probe-webgl';
import type { MapScale } from '@/lib/stage-model/map-scale';
import { createSheetMaterial } from './sheet-material';
import type { StageMap } from './stage-maps';
import { createTemplateMaterial, displayRgb, type StageColours } from './template-material';

const HATCH_CSS_PX = 7;
const MOST_PIXEL_RATIO = 2;
/** Where frames in motion take longer than this, the next ones are drawn coarser. */
const SLOW_FRAME_MS = 40;

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
  private readonly coarse = new BufferGeometry();
  private readonly ink = new BufferGeometry();
  private readonly cut = new BufferGeometry();
  private readonly sheet = new BufferGeometry();
  private readonly sheetMaterial = createSheetMaterial(this.template.scale);
  /** the template's surface, fine enough for the sheet's thickness: drawn instead of the model's for that map */
  private readonly over = new BufferGeometry();
  private readonly overMesh = new Mesh(this.over, this.template.material);
  private map: StageMap = 'plain';
  private readonly sheetMeshes: Mesh[];
  private sheetOpacity = 0;
  private readonly whole: Mesh;
  private readonly light: Mesh;
  private readonly inkLines: LineSegments;
  private readonly cutLines: LineSegments;
  private readonly reach: number;
  private readonly software: boolean;
  private slow: boolean;
  private probe = 0;
  private size = { width: 1, height: 1 };

  constructor(
    readonly canvas: HTMLCanvasElement,
    private readonly model: StageModelData,
  ) {
    // Software smooths edges by drawing a larger picture once at rest; that is cheaper than every frame.
    this.software = probeWebgl().software;
    this.slow = this.software;
    this.renderer = new WebGLRenderer({ canvas, antialias: !this.software, alpha: true });
    this.renderer.setClearAlpha(0);
    const position = new BufferAttribute(model.positions, 3);
    this.surface.setAttribute('position', position);
    this.surface.setAttribute('normal', new BufferAttribute(model.normals, 3));
    this.surface.setAttribute('draft', new BufferAttribute(model.draftDeg, 1));
    this.surface.setAttribute('flags', new BufferAttribute(model.flags, 1));
    if (model.wallMm) this.surface.setAttribute('wall', new BufferAttribute(model.wallMm, 1));
    // Without a pocket the attribute reads 0 everywhere: the depth of a rim, which is not drawn.
    if (model.trapMm) this.surface.setAttribute('trap', new BufferAttribute(model.trapMm, 1));
    this.surface.setIndex(new BufferAttribute(model.index, 1));
    this.surface.computeBoundingSphere();
    this.reach = (this.surface.boundingSphere?.radius ?? 100) * 4;
    this.ink.setAttribute('position', position);
    this.ink.setIndex(new BufferAttribute(model.lines, 1));
    this.cutLines = new LineSegments(this.cut, this.cutMaterial);
    this.cutLines.frustumCulled = false;
    this.inkLines = new LineSegments(this.ink, this.inkMaterial);
    for (const [name, attribute] of Object.entries(this.surface.attributes))
      this.coarse.setAttribute(name, attribute);
    this.coarse.setIndex(new BufferAttribute(model.coarse, 1));
    this.whole = new Mesh(this.surface, this.template.material);
    this.light = new Mesh(this.coarse, this.template.material);
    this.sheetMeshes = [this.sheetMaterial.depth, this.sheetMaterial.material].map((material, pass) => {
      const mesh = new Mesh(this.sheet, material);
      // After the template, depth before colour.
      mesh.renderOrder = 1 + pass;
      mesh.visible = false;
      return mesh;
    });
    this.scene.add(this.whole, this.light, this.inkLines, this.cutLines, this.overMesh, ...this.sheetMeshes);
  }

  resize(width: number, height: number): void {
    this.size = { width: Math.max(1, width), height: Math.max(1, height) };
    this.renderer.setSize(this.size.width, this.size.height, false);
  }

  setMap(map: StageMap, scale: MapScale | null, layerMm: number): void {
    this.map = map;
    this.template.setMap(map, scale, layerMm);
  }

  /** The formed sheet over the template and its thickness on the template's own surface; null takes it away. */
  setSheet(sheet: SheetModelData | null, scale: MapScale | null): void {
    if (sheet && scale) {
      this.sheet.setAttribute('position', new BufferAttribute(sheet.positions, 3));
      this.sheet.setAttribute('normal', new BufferAttribute(sheet.normals, 3));
      this.sheet.setAttribute('thickness', new BufferAttribute(sheet.thicknessMm, 1));
      this.sheet.setAttribute('lies', new BufferAttribute(sheet.lies, 1));
      this.sheet.setIndex(new BufferAttribute(sheet.index, 1));
      this.sheetMaterial.setScale(scale);
      const { over } = sheet;
      this.over.setAttribute('position', new BufferAttribute(over.positions, 3));
      this.over.setAttribute('normal', new BufferAttribute(over.normals, 3));
      this.over.setAttribute('flags', new BufferAttribute(over.flags, 1));
      this.over.setAttribute('sheet', new BufferAttribute(over.sheetMm, 1));
      this.over.setIndex(new BufferAttribute(over.index, 1));
    }
    if (!sheet) this.setSheetOpacity(0);
  }

  /** 0 hides the sheet, 1 covers the template with it. */
  setSheetOpacity(opacity: number): void {
    this.sheetOpacity = this.sheet.index ? opacity : 0;
    this.sheetMaterial.setOpacity(this.sheetOpacity);
    for (const mesh of this.sheetMeshes) mesh.visible = this.sheetOpacity > 0;
  }

  setColours(colours: StageColours): void {
    this.template.setColours(colours);
    this.sheetMaterial.setColours(displayRgb(colours.hatch), displayRgb(colours.ink));
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
    const screen = Math.min(MOST_PIXEL_RATIO, window.devicePixelRatio || 1);
    const plain = moving && this.slow;
    const ratio = plain ? Math.min(1, screen) * 0.75 : this.software ? Math.max(1.5, screen) : screen;
    if (this.renderer.getPixelRatio() !== ratio) this.renderer.setPixelRatio(ratio);
    const hasCoarse = this.model.coarse.length > 0;
    const fine = this.map === 'sheet' && this.over.index !== null && !(plain && hasCoarse);
    this.overMesh.visible = fine;
    this.whole.visible = !fine && !(plain && hasCoarse);
    this.light.visible = plain && hasCoarse;
    this.inkLines.visible = !plain || this.model.lines.length < 20_000;
    this.template.setPitch(HATCH_CSS_PX * ratio);
    this.sheetMaterial.setPitch(HATCH_CSS_PX * ratio);
    this.inkMaterial.opacity = ratio >= 1.5 ? 0.8 : 0.5;
    this.aim(rig);
    this.renderer.render(this.scene, this.camera);
  }

  /** Call after a frame drawn in motion: where the next chance to draw comes late, frames in motion are drawn coarser. */
  timeFrame(): void {
    if (this.probe !== 0) return;
    const start = performance.now();
    this.probe = requestAnimationFrame(() => {
      this.probe = requestAnimationFrame(() => {
        this.probe = 0;
        if ((performance.now() - start) / 2 > SLOW_FRAME_MS) this.slow = true;
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
    this.sheetMaterial.setEye(right, toEye);
  }

  dispose(): void {
    cancelAnimationFrame(this.probe);
    for (const geometry of [this.surface, this.coarse, this.ink, this.cut, this.sheet, this.over])
      geometry.dispose();
    this.sheetMaterial.dispose();
    this.template.dispose();
    this.inkMaterial.dispose();
    this.cutMaterial.dispose();
    this.renderer.dispose();
    this.renderer.forceContextLoss();
  }
}

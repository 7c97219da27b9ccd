import {
  between,
  faceTo,
  fit,
  fromCamera,
  pan,
  STANDARD_VIEWS,
  toCamera,
  turn,
  zoom,
  type Bounds,
  type RigState,
  type StandardViewId,
} from './camera-rig';
import type { StageCamera, Point } from './stage-props';
import type { StageScene } from './stage-scene';
import type { SurfaceHit, SurfacePicker } from './surface-picker';

/** What the stage looked like when it was last drawn; marks over the model are laid out from it. */
export interface StageFrame {
  rig: RigState;
  width: number;
  height: number;
  moving: boolean;
}

const GLIDE_MS = 260;
const REST_MS = 160;
const TURN_STEP_DEG = 15;
const ZOOM_STEP = 1.25;

/** Moves the eye and asks for frames: one per change, none at rest. */
export class StageControl {
  rig: RigState = { azimuth: 45, elevation: 35.264, target: [0, 0, 0], span: 100 };
  private width = 1;
  private height = 1;
  private frame = 0;
  private glide: { from: RigState; to: RigState; start: number } | null = null;
  private rest: ReturnType<typeof setTimeout> | undefined;
  private moving = false;
  private footPx = 0;
  /** nobody has moved the eye yet, so a stage that changes its size may fit the model again */
  private untouched = true;
  private drawn: StageFrame | null = null;
  private readonly listeners = new Set<() => void>();

  constructor(
    private readonly scene: StageScene,
    private readonly picker: SurfacePicker,
    private readonly bounds: Bounds,
    private readonly onRest: (view: StageCamera) => void,
  ) {}

  resize(width: number, height: number): void {
    this.width = width;
    this.height = height;
    this.scene.resize(width, height);
    if (this.untouched) this.rig = this.fitted(this.rig);
    // Drawn at once: the browser has just emptied the canvas.
    this.draw();
  }

  /** The frame on the screen, for marks that lie over it (a store for useSyncExternalStore). */
  readonly subscribe = (tell: () => void): (() => void) => {
    this.listeners.add(tell);
    return () => this.listeners.delete(tell);
  };

  readonly lastFrame = (): StageFrame | null => this.drawn;

  /** Pixels at the foot that words stand on; views are fitted into what is left. */
  setFoot(px: number): void {
    if (px === this.footPx) return;
    this.footPx = px;
    if (this.untouched && this.drawn) {
      this.rig = this.fitted(this.rig);
      this.invalidate();
    }
  }

  private fitted(rig: RigState): RigState {
    const usable = Math.max(this.height / 2, this.height - this.footPx);
    const { span, ...all } = fit(rig, this.bounds, this.width / usable);
    const pxToMm = span / usable;
    return pan({ ...all, span: this.height * pxToMm }, 0, ((this.height - usable) / 2) * pxToMm);
  }

  private get limits(): [number, number] {
    const size = Math.hypot(...this.bounds.max.map((m, a) => m - this.bounds.min[a]));
    return [size / 400, size * 6];
  }

  /** Asks for a frame at the next chance. */
  invalidate(): void {
    if (this.frame === 0) this.frame = requestAnimationFrame(() => this.step());
  }

  private step(): void {
    this.frame = 0;
    if (this.glide) {
      const t = Math.min(1, (performance.now() - this.glide.start) / GLIDE_MS);
      this.rig = between(this.glide.from, this.glide.to, t * t * (3 - 2 * t));
      if (t < 1) this.invalidate();
      else this.glide = null;
    }
    this.draw();
  }

  private draw(): void {
    this.scene.draw(this.rig, this.moving);
    this.drawn = { rig: this.rig, width: this.width, height: this.height, moving: this.moving };
    this.listeners.forEach((tell) => tell());
    if (this.moving) this.scene.timeFrame();
  }

  private move(rig: RigState): void {
    this.untouched = false;
    this.rig = rig;
    this.glide = null;
    this.markMoving();
    this.invalidate();
  }

  private markMoving(): void {
    this.moving = true;
    clearTimeout(this.rest);
    this.rest = setTimeout(
      () => {
        this.moving = false;
        this.invalidate();
        this.onRest(this.view);
      },
      REST_MS + (this.glide ? GLIDE_MS : 0),
    );
  }

  /** Goes to a view: gliding, so that one sees what was turned; at once where less motion is wanted. */
  go(to: RigState, glide = true): void {
    this.untouched = false;
    const still = window.matchMedia('(prefers-reduced-motion: reduce)').matches;
    if (!glide || still) return this.move(to);
    this.glide = { from: this.rig, to, start: performance.now() };
    this.markMoving();
    this.invalidate();
  }

  get view(): StageCamera {
    return toCamera(this.glide?.to ?? this.rig);
  }

  /** Returns to a recorded view. */
  show(camera: StageCamera): void {
    this.go(fromCamera(camera));
  }

  turnBy(azimuth: number, elevation: number): void {
    this.move(turn(this.rig, azimuth, elevation));
  }

  panByPixels(x: number, y: number): void {
    const mm = this.rig.span / this.height;
    this.move(pan(this.rig, x * mm, -y * mm));
  }

  /** Enlarges about a place of the canvas; about the middle without one. */
  zoomBy(factor: number, x = this.width / 2, y = this.height / 2): void {
    const mm = this.rig.span / this.height;
    this.move(zoom(this.rig, factor, [(x - this.width / 2) * mm, (this.height / 2 - y) * mm], this.limits));
  }

  fit(): void {
    this.go(this.fitted(this.rig));
  }

  standard(id: StandardViewId): void {
    const view = STANDARD_VIEWS.find((v) => v.id === id)!;
    this.go(this.fitted({ ...this.rig, azimuth: view.azimuth, elevation: view.elevation }));
  }

  face(at: Point, normal: Point): void {
    this.go(faceTo(this.rig, at, normal));
  }

  pick(x: number, y: number): SurfaceHit | null {
    return this.picker.pick(x, y, this.rig, { width: this.width, height: this.height });
  }

  pickMiddle(): SurfaceHit | null {
    return this.pick(this.width / 2, this.height / 2);
  }

  /** Keys that move the eye. True when the key was one of them. */
  key(event: Pick<KeyboardEvent, 'key' | 'shiftKey' | 'ctrlKey' | 'metaKey' | 'altKey'>): boolean {
    if (event.ctrlKey || event.metaKey || event.altKey) return false;
    const standard = STANDARD_VIEWS.find((v) => v.key === event.key);
    if (standard) {
      this.standard(standard.id);
      return true;
    }
    const arrow = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, 1], ArrowDown: [0, -1] }[event.key];
    if (arrow && event.shiftKey)
      this.panByPixels((-arrow[0] * this.height) / 12, (arrow[1] * this.height) / 12);
    else if (arrow) this.turnBy(arrow[0] * TURN_STEP_DEG, arrow[1] * TURN_STEP_DEG);
    else if (event.key === '+' || event.key === '=') this.zoomBy(ZOOM_STEP);
    else if (event.key === '-' || event.key === '_') this.zoomBy(1 / ZOOM_STEP);
    else if (event.key.toLowerCase() === 'f') this.fit();
    else return false;
    return true;
  }

  dispose(): void {
    cancelAnimationFrame(this.frame);
    clearTimeout(this.rest);
  }
}

import type { Point, StageCamera } from './stage-props';

/** A turntable: turn about the pull axis, tip, shift, zoom. Everything that moves the eye goes through here. */
export interface RigState {
  /** 0 from the front (-y), 90 from the right (+x), degrees */
  azimuth: number;
  /** -90 from below … 90 from above, degrees */
  elevation: number;
  target: Point;
  /** mm that the height of the stage shows */
  span: number;
}

export interface Bounds {
  min: Point;
  max: Point;
}

/** Distance of the eye in a StageCamera for one mm of span: that of a 30° lens, so that the record also suits one. */
const DISTANCE = 1 / (2 * Math.tan((15 * Math.PI) / 180));
const RAD = Math.PI / 180;

export const STANDARD_VIEWS = [
  { key: '1', id: 'front', name: 'Front', azimuth: 0, elevation: 0 },
  { key: '2', id: 'right', name: 'Right', azimuth: 90, elevation: 0 },
  { key: '3', id: 'back', name: 'Back', azimuth: 180, elevation: 0 },
  { key: '4', id: 'left', name: 'Left', azimuth: 270, elevation: 0 },
  { key: '5', id: 'top', name: 'Top', azimuth: 0, elevation: 90 },
  { key: '6', id: 'underside', name: 'Underside', azimuth: 0, elevation: -90 },
  { key: '7', id: 'iso', name: 'Iso', azimuth: 45, elevation: 35.264 },
] as const;

export type StandardViewId = (typeof STANDARD_VIEWS)[number]['id'];

export interface RigAxes {
  right: Point;
  up: Point;
  toEye: Point;
}

export function rigAxes({ azimuth, elevation }: Pick<RigState, 'azimuth' | 'elevation'>): RigAxes {
  const [sa, ca] = [Math.sin(azimuth * RAD), Math.cos(azimuth * RAD)];
  const [se, ce] = [Math.sin(elevation * RAD), Math.cos(elevation * RAD)];
  return { right: [ca, sa, 0], up: [-sa * se, ca * se, ce], toEye: [sa * ce, -ca * ce, se] };
}

export function turn(state: RigState, byAzimuth: number, byElevation: number): RigState {
  const elevation = Math.max(-90, Math.min(90, state.elevation + byElevation));
  return { ...state, azimuth: (state.azimuth + byAzimuth + 360) % 360, elevation };
}

/** Shifts what is seen by mm to the right and up, as it is seen. */
export function pan(state: RigState, rightMm: number, upMm: number): RigState {
  const { right, up } = rigAxes(state);
  return { ...state, target: state.target.map((t, a) => t - right[a] * rightMm - up[a] * upMm) as Point };
}

/** Enlarges by a factor; `held` (mm right and up of the middle) stays where it is seen. */
export function zoom(
  state: RigState,
  factor: number,
  held: [number, number],
  limits: [number, number],
): RigState {
  const span = Math.max(limits[0], Math.min(limits[1], state.span / factor));
  const kept = 1 - span / state.span;
  return { ...pan(state, -held[0] * kept, -held[1] * kept), span };
}

/** Shows all of the bounds with a margin; `aspect` is width over height of the stage. */
export function fit(state: RigState, bounds: Bounds, aspect: number, margin = 1.1): RigState {
  const { right, up } = rigAxes(state);
  const half = bounds.max.map((m, a) => (m - bounds.min[a]) / 2);
  const reach = (axis: Point) => axis.reduce((sum, c, a) => sum + Math.abs(c) * half[a], 0);
  const target = bounds.max.map((m, a) => (m + bounds.min[a]) / 2) as Point;
  const span = 2 * margin * Math.max(reach(up), reach(right) / aspect, 1e-3);
  return { ...state, target, span };
}

export function toCamera(state: RigState): StageCamera {
  const { up, toEye } = rigAxes(state);
  const distance = state.span * DISTANCE;
  return {
    position: state.target.map((t, a) => t + toEye[a] * distance) as Point,
    target: [...state.target],
    up,
  };
}

/** The rig that shows what a recorded camera showed; a roll about the line of sight, which the rig never makes, is lost. */
export function fromCamera({ position, target, up }: StageCamera): RigState {
  const away = position.map((p, a) => p - target[a]) as Point;
  const distance = Math.hypot(...away) || 1;
  const elevation = Math.asin(Math.max(-1, Math.min(1, away[2] / distance))) / RAD;
  const level = Math.hypot(away[0], away[1]) > distance * 1e-6;
  // Straight from above or below the record's own up tells how it was turned.
  const azimuth = level
    ? Math.atan2(away[0], -away[1])
    : Math.atan2(-up[0] * Math.sign(away[2]), up[1] * Math.sign(away[2]));
  return { azimuth: (azimuth / RAD + 360) % 360, elevation, target: [...target], span: distance / DISTANCE };
}

/** Looks at a point of the surface from the side it faces, a little from above. */
export function faceTo(state: RigState, at: Point, normal: Point): RigState {
  const level = Math.hypot(normal[0], normal[1]);
  const azimuth = level > 0.2 ? (Math.atan2(normal[0], -normal[1]) / RAD + 360) % 360 : state.azimuth;
  const steep = Math.atan2(normal[2], level) / RAD;
  const elevation = steep < -20 ? -35 : Math.min(60, Math.max(25, steep));
  return { ...state, azimuth, elevation, target: [...at] };
}

/** Part `t` of the way between two views, the short way round. */
export function between(a: RigState, b: RigState, t: number): RigState {
  const turnBy = ((b.azimuth - a.azimuth + 540) % 360) - 180;
  const blend = (x: number, y: number) => x + (y - x) * t;
  return {
    azimuth: (a.azimuth + turnBy * t + 360) % 360,
    elevation: blend(a.elevation, b.elevation),
    target: a.target.map((x, i) => blend(x, b.target[i])) as Point,
    span: a.span * (b.span / a.span) ** t,
  };
}

/** "isometric view", or the turn and tip in words when no standard view is on. */
export function describeView({ azimuth, elevation }: Pick<RigState, 'azimuth' | 'elevation'>): string {
  const standard = STANDARD_VIEWS.find((v) => {
    const off = Math.abs(((v.azimuth - azimuth + 540) % 360) - 180);
    return Math.abs(v.elevation - elevation) < 0.5 && off < 0.5;
  });
  if (standard) return standard.id === 'iso' ? 'isometric view' : `${standard.name.toLowerCase()} view`;
  const sides = ['front', 'front right', 'right', 'back right', 'back', 'back left', 'left', 'front left'];
  const side = sides[Math.round(azimuth / 45) % 8];
  const tip = Math.round(Math.abs(elevation));
  return `seen from the ${side}, ${tip}° ${elevation < 0 ? 'below' : 'above'} the bed plane`;
}

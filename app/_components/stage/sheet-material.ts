import { DoubleSide, ShaderMaterial, Vector3, type DataTexture } from 'three';
import { STROKES_TURN, type MapScale } from '@/lib/stage-model/map-scale';

const DARK_STROKE = 'vec3(0.114, 0.137, 0.129)';

// The file holds the template's side; what one sees of a formed part is the outer side, a thickness further out.
const vertexShader = /* glsl */ `
  attribute float thickness, lies;
  uniform float outward;
  varying vec3 vNormal;
  varying float vThickness, vLies;
  void main() {
    vNormal = normal;
    vThickness = thickness;
    vLies = lies;
    gl_Position = projectionMatrix * modelViewMatrix * vec4(position + normal * thickness * outward, 1.0);
  }
`;

const fragmentShader = /* glsl */ `
  precision highp float;
  uniform float limit, scaleMax, isoStep, pitch, opacity;
  uniform sampler2D scale;
  uniform vec3 hatch, ink, right, toEye;
  varying vec3 vNormal;
  varying float vThickness, vLies;

  float stripe() {
    float at = mod(gl_FragCoord.x - gl_FragCoord.y, pitch) / pitch;
    float soft = 0.9 / pitch;
    return smoothstep(0.0, soft, at) * (1.0 - smoothstep(0.3, 0.3 + soft, at));
  }

  void main() {
    vec3 n = normalize(gl_FrontFacing ? vNormal : -vNormal);
    float at = clamp(vThickness / scaleMax, 0.0, 1.0);
    vec3 colour = texture2D(scale, vec2((at * 255.0 + 0.5) / 256.0, 0.5)).rgb;
    vec3 stroke = at > ${STROKES_TURN.toFixed(2)} ? ${DARK_STROKE} : hatch;
    if (limit >= 0.0 && vThickness < limit) colour = mix(colour, stroke, 0.75 * stripe());
    float slope = fwidth(vThickness / isoStep);
    if (slope > 1e-4 && slope < 0.4) {
      float off = abs(fract(vThickness / isoStep - 0.5) - 0.5) / slope;
      colour = mix(colour, ink, 0.35 * (1.0 - smoothstep(0.1, 1.1, off)));
    }
    // A little light, so that the shape is seen under its colours; where it lies on nothing it is drawn paler.
    float light = 0.86 + 0.14 * abs(dot(n, toEye)) - 0.12 * dot(n, right);
    colour *= light;
    if (vLies < 0.5) colour = mix(colour, vec3(1.0), 0.35);
    gl_FragColor = vec4(colour, opacity);
  }
`;

export interface SheetMaterial {
  /** writes depth alone, so that only the nearest side of the sheet is blended */
  depth: ShaderMaterial;
  material: ShaderMaterial;
  setScale(scale: MapScale): void;
  setColours(hatch: Vector3, ink: Vector3): void;
  setPitch(px: number): void;
  setEye(right: readonly number[], toEye: readonly number[]): void;
  setOpacity(opacity: number): void;
  dispose(): void;
}

/** The formed sheet over the template, coloured by its thickness, as clear as one wants it. */
export function createSheetMaterial(scale: DataTexture): SheetMaterial {
  const uniforms = {
    limit: { value: -1 },
    scaleMax: { value: 1 },
    isoStep: { value: 0.1 },
    pitch: { value: 8 },
    opacity: { value: 1 },
    outward: { value: 1 },
    scale: { value: scale },
    hatch: { value: new Vector3() },
    ink: { value: new Vector3() },
    right: { value: new Vector3(1, 0, 0) },
    toEye: { value: new Vector3(0, -1, 0) },
  };
  const shared = { vertexShader, fragmentShader, uniforms, side: DoubleSide };
  const depth = new ShaderMaterial({ ...shared, colorWrite: false });
  const material = new ShaderMaterial({ ...shared, transparent: true, depthWrite: false });
  return {
    depth,
    material,
    setScale({ limit, max, isoStep }) {
      uniforms.limit.value = limit ?? -1;
      uniforms.scaleMax.value = max;
      uniforms.isoStep.value = isoStep;
    },
    setColours(hatch, ink) {
      uniforms.hatch.value.copy(hatch);
      uniforms.ink.value.copy(ink);
    },
    setPitch: (px) => void (uniforms.pitch.value = px),
    setEye(right, toEye) {
      uniforms.right.value.fromArray(right as number[]);
      uniforms.toEye.value.fromArray(toEye as number[]);
    },
    setOpacity: (opacity) => void (uniforms.opacity.value = opacity),
    dispose() {
      depth.dispose();
      material.dispose();
    },
  };
}

import {
  Color,
  DataTexture,
  DoubleSide,
  LinearFilter,
  RGBAFormat,
  ShaderMaterial,
  UnsignedByteType,
  Vector3,
} from 'three';
import { cividisTable } from '@/lib/stage-model/cividis';
import { draftScaleMaxDeg, FLAT_FROM_DEG } from '@/lib/stage-model/draft-scale';
import type { StageMap } from './stage-props';

/** Colours of the stage as CSS text, read from the page's theme. */
export interface StageColours {
  /** strokes that strike through colours of the map, light on both themes */
  hatch: string;
  ink: string;
  madder: string;
  clayLight: string;
  clayDark: string;
}

const MAPS: Record<StageMap, number> = { plain: 0, draft: 1, undercut: 2 };

const vertexShader = /* glsl */ `
  attribute float draft;
  attribute float flags;
  varying vec3 vNormal;
  varying float vDraft;
  varying float vFlags;
  void main() {
    vNormal = normal;
    vDraft = draft;
    vFlags = flags;
    gl_Position = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
  }
`;

// Map colours are written as they stand in the table: no light falls on them, so that they can be read.
const fragmentShader = /* glsl */ `
  precision highp float;
  uniform int map;
  uniform float limit, scaleMax, flatFrom, pitch;
  uniform sampler2D scale;
  uniform vec3 clayLight, clayDark, hatch, ink, madder, right, toEye;
  varying vec3 vNormal;
  varying float vDraft;
  varying float vFlags;

  float stripe() {
    float at = mod(gl_FragCoord.x - gl_FragCoord.y, pitch) / pitch;
    float soft = 0.9 / pitch;
    return smoothstep(0.0, soft, at) * (1.0 - smoothstep(0.3, 0.3 + soft, at));
  }

  // Where the value jumps from pixel to pixel (scan noise) a line would be a speck.
  float isoLine(float at, float width) {
    float slope = fwidth(at);
    return slope < 1e-4 || slope > 0.4 ? 0.0 : 1.0 - smoothstep(width - 0.5, width + 0.5, abs(fract(at - 0.5) - 0.5) / slope);
  }

  void main() {
    vec3 n = normalize(gl_FrontFacing ? vNormal : -vNormal);
    float facing = dot(n, toEye);
    float light = 0.3 + 0.4 * max(0.0, n.z) + 0.22 * abs(facing) - 0.24 * dot(n, right);
    vec3 clay = mix(clayDark, clayLight, clamp(light, 0.0, 1.0));
    vec3 colour = clay;
    bool bed = mod(vFlags + 0.5, 2.0) >= 1.0;
    bool undercut = vFlags > 1.5;
    if (map == 1 && !bed && vDraft < flatFrom) {
      colour = texture2D(scale, vec2((clamp(vDraft / scaleMax, 0.0, 1.0) * 255.0 + 0.5) / 256.0, 0.5)).rgb;
      if (vDraft < limit) colour = mix(colour, hatch, 0.75 * stripe());
      colour = mix(colour, ink, 0.35 * isoLine(vDraft / 5.0, 0.6));
      float toLimit = abs(vDraft - limit) / max(fwidth(vDraft), 1e-4);
      if (fwidth(vDraft) > 1e-4 && fwidth(vDraft) < 2.0) colour = mix(colour, ink, 0.9 * (1.0 - smoothstep(0.8, 1.6, toLimit)));
    }
    if (undercut) {
      if (map == 2) colour = mix(colour, madder, 0.28);
      colour = mix(colour, madder, stripe());
    }
    // A round wall's outline: facing runs to nothing within a pixel or so; plane faces never meet this.
    float bend = fwidth(facing);
    if (bend > 1e-3 && abs(facing) < 0.25) colour = mix(colour, ink, 0.8 * (1.0 - smoothstep(0.6, 1.6, abs(facing) / bend)));
    if (!gl_FrontFacing) colour = mix(colour, clayDark, 0.55);
    gl_FragColor = vec4(colour, 1.0);
  }
`;

export interface TemplateMaterial {
  material: ShaderMaterial;
  setMap(map: StageMap): void;
  setLimit(deg: number): void;
  setColours(colours: StageColours): void;
  /** hatch pitch in device pixels */
  setPitch(px: number): void;
  setEye(right: readonly number[], toEye: readonly number[]): void;
  dispose(): void;
}

/** The surface of the template: clay, or one of the maps, with hatching where a limit is broken. */
export function createTemplateMaterial(): TemplateMaterial {
  const scale = new DataTexture(cividisTable(256), 256, 1, RGBAFormat, UnsignedByteType);
  scale.minFilter = LinearFilter;
  scale.magFilter = LinearFilter;
  scale.needsUpdate = true;
  const uniforms = {
    map: { value: 0 },
    limit: { value: 5 },
    scaleMax: { value: 15 },
    flatFrom: { value: FLAT_FROM_DEG },
    pitch: { value: 8 },
    scale: { value: scale },
    clayLight: { value: new Vector3() },
    clayDark: { value: new Vector3() },
    hatch: { value: new Vector3() },
    ink: { value: new Vector3() },
    madder: { value: new Vector3() },
    right: { value: new Vector3(1, 0, 0) },
    toEye: { value: new Vector3(0, -1, 0) },
  };
  const material = new ShaderMaterial({
    vertexShader,
    fragmentShader,
    uniforms,
    side: DoubleSide,
    polygonOffset: true,
    polygonOffsetFactor: 1,
    polygonOffsetUnits: 1,
  });
  return {
    material,
    setMap: (map) => void (uniforms.map.value = MAPS[map]),
    setLimit(deg) {
      uniforms.limit.value = deg;
      uniforms.scaleMax.value = draftScaleMaxDeg(deg);
    },
    setColours(colours) {
      uniforms.clayLight.value.copy(displayRgb(colours.clayLight));
      uniforms.clayDark.value.copy(displayRgb(colours.clayDark));
      uniforms.hatch.value.copy(displayRgb(colours.hatch));
      uniforms.ink.value.copy(displayRgb(colours.ink));
      uniforms.madder.value.copy(displayRgb(colours.madder));
    },
    setPitch: (px) => void (uniforms.pitch.value = px),
    setEye(right, toEye) {
      uniforms.right.value.fromArray(right as number[]);
      uniforms.toEye.value.fromArray(toEye as number[]);
    },
    dispose() {
      material.dispose();
      scale.dispose();
    },
  };
}

/** 0..1 as the display shows it; the shader does no colour conversion of its own. */
function displayRgb(css: string): Vector3 {
  const c = new Color().setStyle(css, 'srgb-linear');
  return new Vector3(c.r, c.g, c.b);
}

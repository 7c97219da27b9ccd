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
import { FLAT_FROM_DEG } from '@/lib/stage-model/draft-scale';
import { STROKES_TURN, type MapScale } from '@/lib/stage-model/map-scale';
import { LAYERS_FROM_DEG, LAYERS_TO_DEG, TRAP_FROM_MM } from '@/lib/stage-model/shown-range';
import { NO_TRAP_MM } from './decode-stage-model';
import type { StageMap } from './stage-maps';

/** Colours of the stage as CSS text, read from the page's theme. */
export interface StageColours {
  /** strokes that strike through colours of the map, light on both themes */
  hatch: string;
  ink: string;
  madder: string;
  clayLight: string;
  clayDark: string;
}

/** Strokes on the light half of the scale; the same on both themes, as the map's colours are. */
const DARK_STROKE = 'vec3(0.114, 0.137, 0.129)';

const MAPS: Record<StageMap, number> = {
  plain: 0,
  draft: 1,
  undercut: 2,
  layers: 3,
  wall: 4,
  trap: 5,
  sheet: 6,
};

// Wall, pocket and sheet come as (figure, has one), both 0 without one: between a vertex that has a figure and one that has
// none the quotient stays the figure, so that no false thin wall appears.
const vertexShader = /* glsl */ `
  attribute float draft, flags, wall, trap, sheet;
  varying vec3 vNormal;
  varying float vDraft;
  varying vec3 vFlags;
  varying vec2 vWall, vTrap, vSheet;
  void main() {
    vNormal = normal;
    vDraft = draft;
    vFlags = vec3(mod(flags, 2.0), mod(floor(flags / 2.0), 2.0), mod(floor(flags / 4.0), 2.0));
    vWall = wall > 0.0 ? vec2(wall, 1.0) : vec2(0.0);
    vTrap = trap > ${NO_TRAP_MM.toFixed(3)} ? vec2(trap, 1.0) : vec2(0.0);
    vSheet = sheet > 0.0 ? vec2(sheet, 1.0) : vec2(0.0);
    gl_Position = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
  }
`;

// Map colours are written as they stand in the table: no light falls on them, so that they can be read.
const fragmentShader = /* glsl */ `
  precision highp float;
  uniform int map;
  uniform float limit, scaleMax, dark, isoStep, layer, flatFrom, pitch;
  uniform sampler2D scale;
  uniform vec3 clayLight, clayDark, hatch, ink, madder, right, toEye;
  varying vec3 vNormal;
  varying float vDraft;
  varying vec3 vFlags;
  varying vec2 vWall, vTrap, vSheet;

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
    bool bed = vFlags.x > 0.5;
    bool undercut = vFlags.y > 0.5;
    float v = 0.0;
    bool shown = false;
    if (map == 1) {
      v = vDraft;
      // What looks down without being an undercut is the inside of a hollow.
      shown = vDraft < flatFrom && (undercut || vDraft > -${LAYERS_FROM_DEG.toFixed(2)});
    } else if (map == 3) {
      v = layer * sin(radians(vDraft));
      shown = vDraft > ${LAYERS_FROM_DEG.toFixed(2)} && vDraft < ${LAYERS_TO_DEG.toFixed(2)};
    } else if (map == 4) {
      v = vWall.x / max(vWall.y, 0.1);
      shown = vWall.y > 0.5;
    } else if (map == 5) {
      v = vTrap.x / max(vTrap.y, 0.1);
      shown = vTrap.y > 0.5 && v > ${TRAP_FROM_MM.toFixed(2)};
    } else if (map == 6) {
      v = vSheet.x / max(vSheet.y, 0.1);
      shown = vSheet.y > 0.5;
    }
    // Outside of the branch: neighbours in a block of pixels must all have a figure to differ from.
    float slope = fwidth(v);
    if (shown && !bed) {
      float at = clamp(v / scaleMax, 0.0, 1.0);
      if (dark > 0.0) at = 1.0 - at;
      colour = texture2D(scale, vec2((at * 255.0 + 0.5) / 256.0, 0.5)).rgb;
      vec3 stroke = at > ${STROKES_TURN.toFixed(2)} ? ${DARK_STROKE} : hatch;
      float beyond = (v - limit) * dark;
      bool broken = map == 5 ? vFlags.z > 0.5 : limit >= 0.0 && beyond > (map == 4 ? 0.005 : 0.0);
      if (broken) colour = mix(colour, stroke, 0.75 * stripe());
      // Half a step off the round figures: walls are drawn with round figures, and a line has no place on a plane.
      if (v < scaleMax) colour = mix(colour, ink, 0.35 * isoLine(v / isoStep + (map == 4 ? 0.5 : 0.0), 0.6));
      float least = map == 1 ? 1e-4 : scaleMax * 5e-4;
      if (map != 5 && limit >= 0.0 && slope > least && slope < scaleMax * 0.13)
        colour = mix(colour, ink, 0.9 * (1.0 - smoothstep(0.8, 1.6, abs(v - limit) / slope)));
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
  /** the colour table, dark to light */
  scale: DataTexture;
  /** `layerMm` is the height of a printed layer, for the map of layer lines */
  setMap(map: StageMap, scale: MapScale | null, layerMm: number): void;
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
    dark: { value: -1 },
    isoStep: { value: 5 },
    layer: { value: 0 },
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
    scale,
    setMap(map, shown, layerMm) {
      uniforms.map.value = MAPS[map];
      uniforms.layer.value = layerMm;
      if (!shown) return;
      uniforms.limit.value = shown.limit ?? -1;
      uniforms.scaleMax.value = shown.max;
      uniforms.dark.value = shown.dark === 'high' ? 1 : -1;
      uniforms.isoStep.value = shown.isoStep;
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
export function displayRgb(css: string): Vector3 {
  const c = new Color().setStyle(css, 'srgb-linear');
  return new Vector3(c.r, c.g, c.b);
}

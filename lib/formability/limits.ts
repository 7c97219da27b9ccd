import type { BasisKind } from './report';

/** One limit: its value where nothing is said, its range, and what it rests on. */
export interface LimitRule {
  value: number;
  unit: string;
  min: number;
  max: number;
  kind: BasisKind;
  source: string;
  label: string;
}

const PRACTICE = 'common practice, no source';

/** Every limit that a studio may move through `recipe.limits`, with the basis of its default. */
export const LIMIT_RULES = {
  draftMinDeg: {
    value: 5,
    unit: 'deg',
    min: 0,
    max: 45,
    kind: 'common practice',
    source: PRACTICE,
    label: 'least draft of a smooth or sanded wall',
  },
  draftFailDeg: {
    value: 3,
    unit: 'deg',
    min: 0,
    max: 45,
    kind: 'handbook',
    source: 'public design guidelines of custom formers: 3° minimum on male tools',
    label: 'draft below which a wall fails',
  },
  layerGrooveMm: {
    value: 0.01,
    unit: 'mm',
    min: 0,
    max: 0.2,
    kind: 'computed',
    source: 'derived: a bead groove of depth w clears the next bead at draft atan(w/h); depth assumed',
    label: 'groove between printed beads that the sheet enters',
  },
  undercutDepthMm: {
    value: 0.2,
    unit: 'mm',
    min: 0,
    max: 20,
    kind: 'common practice',
    source: `${PRACTICE}: shallower is surface texture`,
    label: 'horizontal depth of an undercut that locks the part',
  },
  layerMaxMm: {
    value: 0.2,
    unit: 'mm',
    min: 0.01,
    max: 1,
    kind: 'common practice',
    source: PRACTICE,
    label: 'thickest layer',
  },
  layerMinMm: {
    value: 0.1,
    unit: 'mm',
    min: 0.01,
    max: 1,
    kind: 'common practice',
    source: PRACTICE,
    label: 'thinnest layer worth its print time',
  },
  cuspMaxMm: {
    value: 0.1,
    unit: 'mm',
    min: 0.001,
    max: 1,
    kind: 'common practice',
    source: PRACTICE,
    label: 'step height of the layers that shows through the sheet',
  },
  arealDrawMax: {
    value: 3,
    unit: '',
    min: 1,
    max: 20,
    kind: 'common practice',
    source: PRACTICE,
    label: 'areal draw ratio that forms without pre-stretch',
  },
  arealDrawFail: {
    value: 5,
    unit: '',
    min: 1,
    max: 20,
    kind: 'common practice',
    source: PRACTICE,
    label: 'areal draw ratio beyond which one step does not form',
  },
  depthRatioMax: {
    value: 1,
    unit: '',
    min: 0.05,
    max: 10,
    kind: 'handbook',
    source: 'public design guidelines of custom formers: depth to width below 1:1',
    label: 'template height to the shorter side of the frame',
  },
  linearDrawMax: {
    value: 3,
    unit: '',
    min: 1,
    max: 20,
    kind: 'common practice',
    source: PRACTICE,
    label: 'linear draw ratio of any section',
  },
  heightOverGapMax: {
    value: 1,
    unit: '',
    min: 0.05,
    max: 10,
    kind: 'common practice',
    source: `${PRACTICE}: clear gap at least the height of the shorter neighbour`,
    label: 'height of the lower neighbour over the gap',
  },
  edgeRadiusGauges: {
    value: 1,
    unit: '× gauge',
    min: 0,
    max: 10,
    kind: 'handbook',
    source: 'public design guidelines of custom formers: radius at least the sheet gauge',
    label: 'least radius of edges and inside corners, in gauges',
  },
  airClearS: {
    value: 0.5,
    unit: 's',
    min: 0.01,
    max: 30,
    kind: 'common practice',
    source: `${PRACTICE}: the sheet sets against a cool template within about a second`,
    label: 'time in which the air must leave a pocket',
  },
  shellMinMm: {
    value: 3,
    unit: 'mm',
    min: 0.2,
    max: 50,
    kind: 'common practice',
    source: `${PRACTICE}: shells of 3 to 5 mm on large hollow templates`,
    label: 'least printed wall of a large template',
  },
  shellMaxMm: {
    value: 5,
    unit: 'mm',
    min: 0.2,
    max: 100,
    kind: 'common practice',
    source: `${PRACTICE}: shells of 3 to 5 mm on large hollow templates`,
    label: 'printed wall beyond which material is wasted',
  },
  largeTemplateMm: {
    value: 150,
    unit: 'mm',
    min: 10,
    max: 2000,
    kind: 'common practice',
    source: PRACTICE,
    label: 'longer plan side from which a template counts as large',
  },
  smallTemplateMm: {
    value: 60,
    unit: 'mm',
    min: 5,
    max: 1000,
    kind: 'common practice',
    source: PRACTICE,
    label: 'longer plan side up to which a template counts as small',
  },
  overhangDeg: {
    value: 45,
    unit: 'deg',
    min: 10,
    max: 80,
    kind: 'common practice',
    source: `${PRACTICE}: support-free to 45° from vertical`,
    label: 'overhang from vertical that prints without support',
  },
  releaseDraftDeg: {
    value: 7,
    unit: 'deg',
    min: 0,
    max: 45,
    kind: 'common practice',
    source: PRACTICE,
    label: 'draft from which a template releases dry',
  },
} satisfies Record<string, LimitRule>;

export type LimitKey = keyof typeof LIMIT_RULES;
export type Limits = Record<LimitKey, number>;

export const LIMIT_KEYS = Object.keys(LIMIT_RULES) as LimitKey[];

export const DEFAULT_LIMITS: Limits = Object.fromEntries(
  LIMIT_KEYS.map((key) => [key, LIMIT_RULES[key].value]),
) as Limits;

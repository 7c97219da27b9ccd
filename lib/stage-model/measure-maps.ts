import { facetArea } from './facet-area';
import { binOf } from './map-histogram';
import { LAYERS_FROM_DEG, LAYERS_TO_DEG } from './shown-range';
import {
  DRAFT_ATTRIBUTE,
  FLAG_BED,
  FLAG_UNVENTED,
  MAP_STEP_MM,
  TRAP_ATTRIBUTE,
  WALL_ATTRIBUTE,
  type MapFigures,
  type StageGeometry,
  type StageMaps,
} from './stage-model-meta';

/** A tenth of a millimetre where walls are judged, coarse where they are thick; the last edge is the most a count holds. */
const WALL_EDGES_MM = [
  ...Array.from({ length: 60 }, (_, i) => i / 10),
  ...Array.from({ length: 28 }, (_, i) => 6 + i / 2),
  20,
  25,
  30,
  40,
  60,
  100,
  200,
  655.36,
];
const LAYER_BINS = 50;
const TRAP_BINS = 30;

/** Range and area by figure of every map that the geometry carries. Bed facets count in none. */
export function measureMaps(geometry: StageGeometry): StageMaps {
  return {
    layers: layerFigures(geometry),
    ...(geometry.facetWallMm ? { wall: wallFigures(geometry, geometry.facetWallMm) } : {}),
    ...(geometry.facetSpillMm ? { trap: trapFigures(geometry, geometry.facetSpillMm) } : {}),
  };
}

function layerFigures({ positions, facetDraftDeg, facetFlags }: StageGeometry): MapFigures {
  const edges = Array.from({ length: LAYER_BINS + 1 }, (_, i) => i / LAYER_BINS);
  const tally = new Tally(edges);
  for (let f = 0; f < facetDraftDeg.length; f++) {
    const draft = facetDraftDeg[f];
    if (facetFlags[f] & FLAG_BED || !(draft > LAYERS_FROM_DEG && draft < LAYERS_TO_DEG)) continue;
    tally.add(Math.sin((draft * Math.PI) / 180), facetArea(positions, f));
  }
  return { attribute: DRAFT_ATTRIBUTE, unit: 'mm of step a mm of layer', ...tally.figures() };
}

function wallFigures({ positions, facetFlags }: StageGeometry, wallMm: Float32Array): MapFigures {
  const tally = new Tally(WALL_EDGES_MM);
  const counts = Math.round(1 / MAP_STEP_MM);
  for (let f = 0; f < wallMm.length; f++) {
    if (facetFlags[f] & FLAG_BED || !(wallMm[f] > 0)) continue;
    // As the file holds it: a wall of 3 mm that was measured as 2.9999 is not below 3 mm.
    tally.add(Math.max(1, Math.round(wallMm[f] * counts)) / counts, facetArea(positions, f));
  }
  return { attribute: WALL_ATTRIBUTE, unit: 'mm', step: MAP_STEP_MM, ...tally.figures() };
}

/** A facet's area is spread evenly over the depths that it spans; what stands out of the pocket does not count. */
function trapFigures({ positions, facetFlags }: StageGeometry, spillMm: Float32Array) {
  let deepest = 0;
  eachDepth(positions, spillMm, (_, __, bottom) => {
    if (bottom > deepest) deepest = bottom;
  });
  const edges = Array.from({ length: TRAP_BINS + 1 }, (_, i) => ((deepest || 1) * i) / TRAP_BINS);
  const tally = new Tally(edges);
  let unventedMm2 = 0;
  eachDepth(positions, spillMm, (f, top, bottom) => {
    const whole = facetArea(positions, f);
    const under = bottom > top ? Math.min(1, bottom / (bottom - top)) : 1;
    tally.spread(Math.max(0, top), bottom, whole * under);
    if (facetFlags[f] & FLAG_UNVENTED) unventedMm2 += whole * under;
  });
  return { attribute: TRAP_ATTRIBUTE, unit: 'mm', step: MAP_STEP_MM, ...tally.figures(), unventedMm2 };
}

/** Depths of a facet's highest and lowest corner below the level, the first negative where it stands out of the pocket. */
function eachDepth(
  p: Float32Array,
  spillMm: Float32Array,
  visit: (facet: number, top: number, bottom: number) => void,
): void {
  for (let f = 0; f < spillMm.length; f++) {
    const level = spillMm[f];
    if (!(level > 0)) continue;
    const bottom = level - Math.min(p[f * 9 + 2], p[f * 9 + 5], p[f * 9 + 8]);
    if (bottom <= 0) continue;
    visit(f, level - Math.max(p[f * 9 + 2], p[f * 9 + 5], p[f * 9 + 8]), bottom);
  }
}

class Tally {
  private readonly area: Float64Array;
  private low = Infinity;
  private high = -Infinity;

  constructor(private readonly edges: readonly number[]) {
    this.area = new Float64Array(edges.length - 1);
  }

  add(figure: number, areaMm2: number): void {
    this.see(figure, figure);
    this.area[binOf(this.edges, figure)] += areaMm2;
  }

  spread(from: number, to: number, areaMm2: number): void {
    this.see(from, to);
    const first = binOf(this.edges, from);
    const last = binOf(this.edges, to);
    if (first === last || to <= from) {
      this.area[last] += areaMm2;
      return;
    }
    for (let b = first; b <= last; b++) {
      const part = Math.min(to, this.edges[b + 1]) - Math.max(from, this.edges[b]);
      this.area[b] += (areaMm2 * Math.max(0, part)) / (to - from);
    }
  }

  figures(): Pick<MapFigures, 'range' | 'histogram'> {
    const range: MapFigures['range'] = this.low > this.high ? null : [this.low, this.high];
    return { range, histogram: { edges: [...this.edges], areaMm2: Array.from(this.area) } };
  }

  private see(low: number, high: number): void {
    if (low < this.low) this.low = low;
    if (high > this.high) this.high = high;
  }
}

import { renderToStaticMarkup } from 'react-dom/server';
import type { ReactElement } from 'react';
import { beforeAll, describe, expect, it } from 'vitest';
import { LayerLegend, SheetLegend, TrapLegend, WallLegend } from '@/app/_components/stage/length-legends';
import { figureAt, readSurface } from '@/app/_components/stage/read-surface';
import { ticksOf } from '@/app/_components/stage/scale-legend';
import { StageFallback } from '@/app/_components/stage/stage-fallback';
import { mapOfCheck, offeredMaps, scaleOfMap, STAGE_MAPS } from '@/app/_components/stage/stage-maps';
import type { SurfaceHit } from '@/app/_components/stage/surface-picker';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { frustum, geometryOf } from '../../stage-model/shapes';

const limits: StageLimits = { draftDeg: 5, layerMm: 0.2, stepMm: 0.1, wallMm: 3, sheetMm: 0.35 };
const SIDE = 60;
const HEIGHT = 30;
const DRAFT = 40;
const top = SIDE - 2 * HEIGHT * Math.tan((20 * Math.PI) / 180);

/** 30 cm² of part, a third of it between 0.2 and 0.4 mm. */
const sheet: SheetModelMeta = {
  schema: 1,
  nodes: [65, 65],
  triangles: 8192,
  bytes: 9000,
  gaugeMm: 1,
  quantumMm: 0.001,
  boundsMm: { min: [-60, -60, 0], max: [60, 60, 30] },
  rangeMm: [0.24, 0.98],
  histogram: { edges: [0, 0.2, 0.4, 0.8, 1], areaMm2: [0, 1000, 1200, 800] },
  areaMm2: { part: 3000, foot: 5000 },
};

/** Walls at 20°, the wall figure and the pocket of each facet as given: a part that no engine need have seen. */
async function metaWith(wallMm: number, spillMm: number, unvented: boolean): Promise<StageModelMeta> {
  const geometry = geometryOf(frustum(SIDE, HEIGHT, 20));
  const facets = geometry.facetDraftDeg.length;
  const wall = Array.from(geometry.facetDraftDeg, (d) => (d > 0 && d < 60 ? wallMm : NaN));
  const spill = Array.from(geometry.facetDraftDeg, (d) => (d > 60 ? spillMm : NaN));
  if (unvented) for (let f = 0; f < facets; f++) if (spill[f] > 0) geometry.facetFlags[f] |= 4;
  return (
    await buildStageModel({
      ...geometry,
      facetWallMm: Float32Array.from(wall),
      facetSpillMm: Float32Array.from(spill),
    })
  ).meta;
}

const words = (element: ReactElement) =>
  renderToStaticMarkup(element)
    .replace(/<\/?span[^>]*>/g, '')
    .replace(/<[^>]*>/g, ' ')
    .replace(/[\s\u00a0]+/g, ' ')
    .trim();
const label = (element: ReactElement) =>
  /aria-label="([^"]*)"/.exec(renderToStaticMarkup(element))![1].replace(/\u00a0/g, ' ');

let thin: StageModelMeta;
let sound: StageModelMeta;
let old: StageModelMeta;
beforeAll(async () => {
  thin = await metaWith(2.5, 42, true);
  sound = await metaWith(3, 42, false);
  const { maps: _, ...rest } = sound;
  old = { ...rest, schema: 1 };
});

describe('maps that a model offers', () => {
  it('are all seven where it carries them and the recipe names a layer', () => {
    expect(offeredMaps(thin, limits, sheet)).toEqual(STAGE_MAPS.map(({ id }) => id));
    expect(offeredMaps(thin, { layerMm: null }, sheet)).not.toContain('layers');
  });
  it('are without wall and trapped air on a model of schema 1', () => {
    expect(offeredMaps(old, limits, null)).toEqual(['plain', 'draft', 'undercut', 'layers']);
    expect(offeredMaps(thin, limits, null)).not.toContain('sheet');
  });
  it('have a scale each, but plain and undercut', () => {
    expect(STAGE_MAPS.map(({ id }) => scaleOfMap(id, thin, limits, sheet)?.max ?? null)).toEqual([
      null, 15, null, 0.2, 9, 12, 1,
    ]); // prettier-ignore
  });
  it('are what the checks lead to', () => {
    expect(['draft', 'undercut', 'layers', 'shell', 'air', 'vents'].map(mapOfCheck)).toEqual([
      'draft', 'undercut', 'layers', 'wall', 'trap', 'trap',
    ]); // prettier-ignore
    expect(mapOfCheck('fit')).toBeNull();
  });
});

describe('legends of the lengths', () => {
  const wallArea = (4 * ((SIDE + top) / 2) * HEIGHT) / Math.cos((20 * Math.PI) / 180);

  it('say how much wall is below the limit and from where to where it runs', () => {
    const legend = <WallLegend wall={thin.maps!.wall!} limits={limits} reading={2.5} />;
    const area = `${(wallArea / 100).toFixed(1)} cm²`;
    expect(words(legend)).toContain(
      `${area} of the faces measured, 100 %, below 3.00 mm, hatched. Thickness from 2.50 to 2.50 mm.`,
    );
    expect(label(legend)).toContain('Scale of wall thickness from 0 to 9.00 mm. Limit 3.00 mm.');
    const kept = words(<WallLegend wall={sound.maps!.wall!} limits={limits} reading={null} />);
    expect(kept).toContain('0 mm² of the faces measured, 0.0 %, below 3.00 mm. Thickness');
    expect(kept).not.toContain('hatched');
  });

  it('say how much slope has steps above the limit; sin 20° of 0.2 mm is 0.068 mm', () => {
    const legend = (stepMm: number | null) => (
      <LayerLegend maps={thin.maps} limits={{ ...limits, stepMm }} layerMm={0.2} reading={null} />
    );
    expect(words(legend(0.1))).toContain(
      '0 mm² of the sloping faces, 0.0 %, above 0.100 mm. Steps from 0.068',
    );
    expect(words(legend(0.05))).toMatch(/cm² of the sloping faces, 100 %, above 0.050 mm, hatched/);
    expect(words(legend(null))).toMatch(/cm² of sloping faces, sanded after printing. Steps from 0.068/);
    expect(words(<LayerLegend maps={undefined} limits={limits} layerMm={0.2} reading={null} />)).toContain(
      'was not counted',
    );
  });

  it('say how deep the pockets are and how much of them has no vent', () => {
    expect(words(<TrapLegend maps={thin.maps!} reading={12} />)).toMatch(
      /cm² in pockets without a vent, 100 % of all pockets, hatched. Pockets reach 12.0 mm below the rim/,
    );
    expect(words(<TrapLegend maps={sound.maps!} reading={null} />)).toMatch(
      /cm² in pockets, all with a vent. Pockets reach 12.0 mm/,
    );
    const none = { ...thin.maps!, trap: { ...thin.maps!.trap!, range: null } };
    expect(words(<TrapLegend maps={none} reading={null} />)).toBe(
      'Trapped air No pocket: the air runs off everywhere.',
    );
  });

  it('are said by the page without 3D as well, for the maps that the model has', () => {
    const page = (meta: StageModelMeta) =>
      words(<StageFallback title="T" pictureUrl="/p.png" meta={meta} limits={limits} reason="No WebGL." />);
    expect(page(thin)).toMatch(/Wall thickness [\d.]+ cm² of the faces measured, 100 %, below 3.00 mm/);
    expect(page(thin)).toMatch(/Trapped air [\d.]+ cm² in pockets without a vent/);
    expect(page(thin)).toMatch(/Layer lines 0 mm² of the sloping faces/);
    expect(page(old)).not.toMatch(/Wall thickness|Trapped air|Layer lines/);
  });
});

describe('ticks of a scale', () => {
  it.each([
    [{ max: 15, limit: 5 }, [0, 5, 10, 15]],
    [{ max: 9, limit: 3 }, [0, 3, 6, 9]],
    [{ max: 0.15, limit: 0.1 }, [0, 0.05, 0.1, 0.15]],
    [{ max: 6, limit: 0.5 }, [0.5, 2, 4, 6]],
    [{ max: 6, limit: 8 }, [0, 2, 4, 6]],
    [{ max: 12, limit: null }, [0, 4, 8, 12]],
  ])('%j', (scale, ticks) => {
    expect(ticksOf(scale).map((figure) => Number(figure.toFixed(6)))).toEqual(ticks);
  });
});

describe('the legend of the formed sheet', () => {
  it('tells the part’s thin area against what is wanted, and that it is an estimate', () => {
    const legend = <SheetLegend sheet={sheet} limits={limits} reading={null} />;
    // Of 1000 mm² between 0.2 and 0.4 mm three quarters lie below 0.35 mm.
    expect(words(legend)).toContain('750 mm² of the part, 25 %, below the 0.35 mm wanted, hatched');
    expect(words(legend)).toContain('Thickness from 0.24 to 0.98 mm. An estimate from 1.00 mm of sheet');
    expect(label(legend)).toContain('Limit 0.35 mm.');
  });
  it('hatches nothing where nothing is wanted', () => {
    const free = <SheetLegend sheet={sheet} limits={{ ...limits, sheetMm: null }} reading={0.5} />;
    expect(words(free)).toContain('30.0 cm² of the part');
    expect(words(free)).not.toContain('hatched');
    const enough = <SheetLegend sheet={sheet} limits={{ ...limits, sheetMm: 0.2 }} reading={null} />;
    expect(words(enough)).toContain('None of the part’s 30.0 cm² below the 0.20 mm wanted');
  });
});

describe('the figure of the map at a place', () => {
  const hit: SurfaceHit = {
    at: [1, 2, 3],
    normal: [0, 0, 1],
    draftDeg: DRAFT,
    undercut: false,
    bed: false,
    wallMm: 2.984,
    sheetMm: 0.304,
    trapMm: 4.26,
    unvented: true,
  };
  const at = ', at x 1.0 mm, y 2.0 mm, z 3.0 mm';
  const read = (change: Partial<SurfaceHit>, map: Parameters<typeof readSurface>[1], l = limits) =>
    readSurface({ ...hit, ...change }, map, l, 'mm')
      .replace(/\u00a0/g, ' ')
      .replace(at, '');

  it('is read in the words of its map', () => {
    expect(read({}, 'plain')).toBe('Draft 40.0°');
    expect(read({}, 'layers')).toBe('Step 0.129 mm, above the limit of 0.100 mm');
    expect(read({}, 'layers', { ...limits, stepMm: null })).toBe('Step 0.129 mm');
    expect(read({ draftDeg: 90 }, 'layers')).toBe('Flat, no step');
    expect(read({ draftDeg: 0 }, 'layers')).toBe('Upright, no step');
    expect(read({ draftDeg: -30 }, 'layers')).toBe('Looks down, no step told');
    expect(read({}, 'wall')).toBe('Wall 2.98 mm, below the limit of 3.00 mm');
    expect(read({ wallMm: 2.996 }, 'wall')).toBe('Wall 3.00 mm');
    expect(read({ wallMm: null }, 'wall')).toBe('No wall measured');
    expect(read({}, 'sheet')).toBe('Sheet about 0.30 mm, below the 0.35 mm wanted');
    expect(read({ sheetMm: 0.4 }, 'sheet')).toBe('Sheet about 0.40 mm');
    expect(read({ sheetMm: null }, 'sheet')).toBe('The sheet does not reach this place');
    expect(figureAt({ ...hit }, 'sheet', limits)).toBe(0.304);
    expect(read({}, 'trap')).toBe('4.3 mm below the rim, no vent');
    expect(read({ unvented: false }, 'trap')).toBe('4.3 mm below the rim, vented');
    expect(read({ trapMm: null }, 'trap')).toBe('No pocket');
    expect(read({ bed: true }, 'wall')).toBe('Stands on the bed');
    expect(readSurface(hit, 'wall', limits, 'in')).toContain('Wall 0.117\u00a0in');
  });

  it('stands on the scale of its map, and nowhere where the map says nothing', () => {
    expect(STAGE_MAPS.map(({ id }) => figureAt(hit, id, limits))).toEqual([
      null, 40, null, expect.closeTo(0.2 * Math.sin((40 * Math.PI) / 180), 9), 2.984, 4.26, 0.304,
    ]); // prettier-ignore
    const bare = { ...hit, bed: true };
    expect(STAGE_MAPS.every(({ id }) => figureAt(bare, id, limits) === null)).toBe(true);
  });
});

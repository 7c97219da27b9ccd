import { describe, expect, it } from 'vitest';
import { facetFlags } from '@/lib/formability/facet-output';
import { findPits } from '@/lib/formability/measures/find-pits';
import { findWalls, judgeWalls, wallRegions } from '@/lib/formability/measures/judge-walls';
import { DRAFT_BIN_EDGES, measureDraft } from '@/lib/formability/measures/measure-draft';
import { measureLayers } from '@/lib/formability/measures/measure-layers';
import { findOverhangs } from '@/lib/formability/measures/overhangs';
import { markTouched } from '@/lib/formability/measures/visibility';
import { measureFacets } from '@/lib/formability/mesh/measure-facets';
import { suggestScale } from '@/lib/formability/mesh/suggest-scale';
import { checkCoordinates } from '@/lib/formability/parse/check-coordinates';
import { checkTriangles } from '@/lib/formability/parse/size-caps';
import { madeFacets, type Leaning } from './made-facets';

/** Thresholds of the engine's contract, each with a facet, a pit or a size just inside and one just beyond. */

const one = (deg: number, areaMm2 = 10): Leaning[] => [{ deg, areaMm2 }];

describe('draft: vertical within 0.25°, walls up to 85°', () => {
  const draft = (deg: number) => measureDraft(madeFacets(one(deg)).facets).draft;

  it('0.25° is vertical either way, and a wall beyond', () => {
    expect([draft(0.2495), draft(-0.2495)].map((d) => d.verticalAreaMm2)).toEqual([10, 10]);
    expect([draft(0.2505), draft(-0.2505)].map((d) => d.verticalAreaMm2)).toEqual([0, 0]);
    expect([draft(0.2495), draft(0.2505)].map((d) => d.minUpFacingDeg)).toEqual([
      null,
      expect.closeTo(0.2505, 9),
    ]);
  });

  it('85° is a top', () => {
    expect(draft(84.9).minUpFacingDeg).toBeCloseTo(84.9, 9);
    expect(draft(85.1).minUpFacingDeg).toBeNull();
  });

  const EDGES = [-90, -60, -30, -10, -2, -0.25, 0.25, 1, 2, 4, 6, 10, 15, 30, 60, 85, 90];
  it('bins have the edges of the contract', () => expect(DRAFT_BIN_EDGES).toEqual(EDGES));

  it.each(EDGES.slice(1, -1))('%s° belongs above its edge, and what rounds to it', (edge) => {
    const bin = (deg: number) => draft(deg).areaByBinMm2.findIndex((area) => area > 0);
    const above = EDGES.indexOf(edge);
    expect([bin(edge), bin(edge - 0.995e-4), bin(edge - 1.005e-4)]).toEqual([above, above, above - 1]);
  });
});

describe('layers: steps from 0.25° to 89.5° of draft', () => {
  it('a flatter or steeper facet has none', () => {
    const cusp = (deg: number) => measureLayers(madeFacets(one(deg)).facets, 0.2, 0.01).cuspMaxMm;
    expect([cusp(0.2495), cusp(89.6)]).toEqual([0, 0]);
    expect(cusp(0.2505)).toBeCloseTo(0.2 * Math.sin((0.2505 * Math.PI) / 180), 9);
    expect(cusp(89.4)).toBeCloseTo(0.2 * Math.sin((89.4 * Math.PI) / 180), 9);
  });
});

describe('walls that the sheet touches: from −45° to 60° of draft', () => {
  const judge = (leaning: Leaning[], limitDeg = 5) => {
    const { mesh, facets, seen, none, draft } = madeFacets(leaning);
    const walls = findWalls(facets, draft, seen.touched, none);
    const judged = judgeWalls(mesh, facets, draft, walls, limitDeg);
    return { ...judged, regions: wallRegions(mesh, facets, draft, walls, judged, limitDeg) };
  };

  it('what leans out further is a ceiling, what lies flatter a slope', () => {
    const area = (deg: number) => judge(one(deg)).wallAreaMm2;
    expect([area(-45.2), area(-44.8), area(59.8), area(60.2)]).toEqual([0, 10, 10, 0]);
  });

  it('a wall drawn with the limit and rounded by less than 0.01° holds', () => {
    const below = (deg: number) => judge(one(deg)).areaBelowMm2;
    expect([below(4.99005), below(4.98995)]).toEqual([0, 10]);
  });

  it('slivers of less than 0.5 mm², or a thousandth of the walls, go unnoticed', () => {
    const below = (sliver: number, wall: number) =>
      judge([{ deg: 1, areaMm2: sliver }, { deg: 8, areaMm2: wall }]).areaBelowMm2; // prettier-ignore
    expect([below(0.4975, 100), below(0.5025, 100)]).toEqual([0, 0.5025]);
    expect([below(9.96, 9990), below(10.06, 9990)]).toEqual([0, 10.06]);
    expect(judge([{ deg: 1, areaMm2: 0.4975 }, { deg: 8, areaMm2: 100 }]).facetDeg).toBe(8); // prettier-ignore
  });

  it('regions of less than 0.5 mm² are not listed, nor more than 24', () => {
    const small = judge([{ deg: 1, areaMm2: 9 }, { deg: 1, areaMm2: 0.4975 }, { deg: 1, areaMm2: 0.5025 }]); // prettier-ignore
    expect(small.regions.map(({ areaMm2 }) => areaMm2)).toEqual([9, 0.5025]);
    expect(judge(Array.from({ length: 30 }, () => ({ deg: 1, areaMm2: 4 }))).regions).toHaveLength(24);
  });

  it('facets lower than 1 mm are steps, where they make more than 0.8 of what is steep', () => {
    const stepped = (highMm: number, steep: number) =>
      judge([{ deg: 0, areaMm2: steep, highMm }, { deg: 0, areaMm2: 100 - steep, highMm: 9 }]).stepped; // prettier-ignore
    expect([stepped(0.995, 90), stepped(1.005, 90)]).toEqual([true, false]);
    expect([stepped(0.5, 79.6), stepped(0.5, 80.4)]).toEqual([false, true]);
  });

  it('facets that the sheet sees less than half of are none', () => {
    const seen = (share: number) => {
      const { facets, draft, none, seen: all } = madeFacets(one(3));
      return findWalls(facets, draft, markTouched(all.visible.fill(share), all.shadowed), none).areaMm2;
    };
    expect([seen(0.4975), seen(0.5025)]).toEqual([0, 10]);
  });
});

describe('overhangs: 0.01° of rounding, 1 mm² in all', () => {
  const area = (deg: number, areaMm2: number) => {
    const { mesh, facets, none } = madeFacets(one(deg, areaMm2));
    return findOverhangs(mesh, facets, none, 45).areaMm2;
  };
  it('45° is support-free with its rounding', () => {
    expect([area(-45.00995, 4), area(-45.01005, 4)]).toEqual([0, 4]);
  });
  it('smaller ones print anyway', () => {
    expect([area(-60, 0.995), area(-60, 1.005)]).toEqual([0, 1.005]);
  });
  it('the twelve largest are shown', () => {
    const { mesh, facets, none } = madeFacets(Array.from({ length: 15 }, () => one(-60)[0]));
    expect(findOverhangs(mesh, facets, none, 45).places).toHaveLength(12);
  });
});

describe('facets of the model: bit 0 on the bed, bit 1 undercut, bit 2 in a pocket without a vent', () => {
  const flags = (deg: number, shares: { visible: number; shadowed: number }, bed = 0, unvented = 0) => {
    const { facets, seen } = madeFacets(one(deg));
    facets.bed[0] = bed;
    seen.visible[0] = shares.visible;
    seen.shadowed[0] = shares.shadowed;
    return facetFlags(facets, seen, Uint8Array.of(unvented))[0];
  };
  it('have the bits that the viewer reads', () => {
    expect(flags(-90, { visible: 1, shadowed: 0 }, 1)).toBe(1);
    expect(flags(10, { visible: 1, shadowed: 0 }, 0, 1)).toBe(4);
    expect(flags(10, { visible: 1, shadowed: 0 })).toBe(0);
  });
  it('lie in the shadow by more than half', () => {
    expect([0.4975, 0.5025].map((shadowed) => flags(10, { visible: 0.4, shadowed }))).toEqual([0, 2]);
    expect([0.4975, 0.5025].map((visible) => flags(-10, { visible, shadowed: 0 }))).toEqual([0, 2]);
  });
});

describe('pits: deeper than 0.05 mm', () => {
  /** A basin 3 cells wide between walls, its floor `deep` below the rim. */
  const pits = (deep: number, saddle = 0) => {
    const profile = [10, 10 - deep, 10 - saddle, 10 - deep, 10];
    const grid = { nx: 5, ny: 3, cell: 1, x0: 0, y0: 0 };
    const surface = Float64Array.from([...Array(5).fill(10), ...profile, ...Array(5).fill(10)] as number[]);
    const level = Float64Array.from(surface, (z) => Math.max(z, 10));
    return findPits(surface, level, grid as never);
  };
  it('a shallower one is surface', () => {
    expect([pits(0.04975).length, pits(0.05025).length]).toEqual([0, 2]);
  });
  it('two basins are two pits where the saddle stands 0.05 mm above both', () => {
    expect(pits(1, 0.9).length).toBe(3);
    expect([pits(1, 0.9495).length, pits(1, 0.9505).length]).toEqual([3, 1]);
  });
});

describe('scale: a plan of 20 to 2000 mm is a template’s', () => {
  it('and is left as it is', () => {
    expect([suggestScale([20.1, 5, 5]), suggestScale([1990, 5, 5])]).toEqual([null, null]);
    expect(suggestScale([19.9, 5, 5])).not.toBeNull();
    expect(suggestScale([2010, 5, 5])).not.toBeNull();
  });

  it.each<[number[], number, string]>([
    [[80 / 25.4, 60 / 25.4, 30 / 25.4], 25.4, 'inches'],
    [[12, 8.5, 4], 10, 'centimetres'],
    [[0.3, 0.2, 0.05], 1000, 'metres'],
    [[1.25, 0.5, 0.5], 304.8, 'feet'],
    [[0.127, 0.0254, 0.0254], 1000, 'metres'],
    [[2032, 1536.7, 762], 1 / 25.4, 'inches read as millimetres twice'],
    [[3010, 2000, 1500], 0.1, 'tenths'],
    [[300_000, 200_000, 50_000], 0.001, 'microns'],
  ])('%j asks for × %f (%s)', (sizes, factor) => {
    expect(suggestScale(sizes)).toBeCloseTo(factor, 12);
  });

  it('sizes in half millimetres speak for a factor, within 0.001 mm', () => {
    // 5.0000995 × 10 = 50.000995; × 25.4 = 127.0025.
    expect([suggestScale([5.0000995]), suggestScale([5.0001005])]).toEqual([10, 25.4]);
  });

  it('a factor must bring the part to between 30 and 800 mm', () => {
    // 1.182 × 25.4 = 30.02 mm; 1.18 × 25.4 = 29.97 mm, so only metres and feet are left.
    expect(suggestScale([1.182])).not.toBe(suggestScale([1.18]));
    // 0.7995 m and 0.8005 m.
    expect([suggestScale([0.7995]), suggestScale([0.8005])]).toEqual([1000, 304.8]);
  });
});

describe('facets of the mesh', () => {
  const triangle = (corners: number[]) =>
    measureFacets({
      triangles: 1,
      vertices: 3,
      index: Uint32Array.of(0, 1, 2),
      position: Float64Array.from(corners),
      centre: [0, 0],
    });
  it('lie on the bed within 0.0001 mm, facing down', () => {
    const bed = (z: number) => triangle([0, 0, 0, 0, 5, z, 5, 0, 0]).bed[0];
    expect([bed(0.995e-4), bed(1.005e-4)]).toEqual([1, 0]);
  });
  it('have no area where they are lower than a ten-millionth of their length', () => {
    const degenerate = (high: number) => triangle([0, 0, 1, 10, 0, 1, 5, high, 1]).degenerate;
    expect([degenerate(0.995e-6), degenerate(1.005e-6)]).toEqual([1, 0]);
  });
});

it('coordinates reach to 1,000,000 mm', () => {
  const taken = (mm: number) => () => checkCoordinates(Float32Array.of(0, 0, 0, mm, 0, 0, 0, 1, 0), 1);
  expect(taken(999_900)).not.toThrow();
  expect(taken(1_000_100)).toThrow(/1,?000,?000|1e\+?6|km/i);
});

it('a part has 12,000,000 facets at most', () => {
  expect(() => checkTriangles(12_000_000, 'it')).not.toThrow();
  expect(() => checkTriangles(12_000_001, 'it')).toThrow('it has 12000001 facets');
});

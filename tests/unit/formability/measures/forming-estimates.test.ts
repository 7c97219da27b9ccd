import { describe, expect, it } from 'vitest';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { estimateHeat } from '@/lib/formability/measures/estimate-heat';
import { estimateLife, type LifeInput } from '@/lib/formability/measures/estimate-life';
import { estimatePulls } from '@/lib/formability/measures/estimate-pulls';
import { estimateThinning, thinningOfPit } from '@/lib/formability/measures/estimate-thinning';
import { estimateWeb } from '@/lib/formability/measures/estimate-web';
import {
  coneThinning,
  cylinderCornerThinning,
  ridgeThinning,
  truncatedConeThinning,
  wedgeThinning,
} from '@/lib/formability/sheet/thinning-rules';

/** Which rule an estimate takes and with what, at its edges; the rules themselves are held to the handbook's rows. */

describe('pulls', () => {
  it('tells the depths from 0.1 to 32 mm, and takes the infill as a share', () => {
    const recipe = fillRecipe({ run: { pulls: 2 } });
    const runs = new Map();
    const { profile } = estimatePulls(recipe, estimateHeat(recipe), 60, runs);
    expect(profile.map(({ depthMm }) => depthMm)).toEqual([0.1, 0.25, 0.5, 1, 2, 4, 8, 16, 32]);
    expect([...runs.keys()].map((key) => (JSON.parse(key) as { infillShare: number }).infillShare)).toEqual([
      0.35,
    ]);
  });
});

describe('thinning by the classical rules, 1.5 mm beside the corner', () => {
  const part = (changes: object) => {
    const plan = { frameMm: [160, 120], frameAreaMm2: 19_200, formedAreaMm2: 30_000 };
    const given = { traps: [], spacing: [], plan, size: [100, 80, 40], topAreaMm2: 8000, ...changes };
    return estimateThinning(given as never, 1, null);
  };
  /** A round pit cut off at a floor radius, as the report has it. */
  const pit = (mouth: number, floor: number, depth: number) => ({
    floor: [0, 0, 0] as [number, number, number],
    spillZMm: depth,
    planAreaMm2: Math.PI * mouth ** 2,
    volumeMm3: ((Math.PI * depth) / 3) * (mouth ** 2 + mouth * floor + floor ** 2),
  });
  const angle = (depth: number, run: number) => (Math.atan2(depth, run) * 180) / Math.PI;

  it('foot of the outer wall: a ridge 40 mm high, 20 mm from the frame', () => {
    expect(part({}).find(({ rule }) => rule === 'foot')?.ruleMm).toBeCloseTo(ridgeThinning(20, 40, 1.5), 12);
  });

  it('a floor of less than a twentieth of the mouth is a point', () => {
    expect([0.0498, 0.0502].map((share) => thinningOfPit(pit(20, share * 20, 30))?.rule)).toEqual(['pit-cone', 'pit-frustum']); // prettier-ignore
    const share = coneThinning(angle(30, 20), 1.5 / 20);
    expect(thinningOfPit(pit(20, 0, 30))?.share).toBeCloseTo(share, 6);
  });

  it('one of more than 0.97 of it has straight walls', () => {
    expect([0.9695, 0.9705].map((share) => thinningOfPit(pit(20, share * 20, 30))?.rule)).toEqual(['pit-frustum', 'pit-cylinder']); // prettier-ignore
    expect(thinningOfPit(pit(20, 20, 30))?.share).toBeCloseTo(cylinderCornerThinning(20, 30, 1.5), 9);
  });

  it('a frustum between', () => {
    const deg = angle(30, 12);
    expect(thinningOfPit(pit(20, 8, 30))?.share).toBeCloseTo(truncatedConeThinning(20, 8, deg, 1.5), 6);
  });

  it('a pit no wider than the disc has no rule', () => {
    expect([1.4925, 1.5075].map((mouth) => thinningOfPit(pit(mouth, 0, 3)) === null)).toEqual([true, false]);
  });

  it('sides that close to less than a tenth are a groove', () => {
    const groove = (share: number) =>
      part({ spacing: [{ gapMm: 20, gapAtBedMm: share * 20, heightMm: 30, between: [[0, 0, 0], [1, 0, 0]] }] }).find(({ rule }) => rule === 'groove'); // prettier-ignore
    expect(groove(0.0995)?.ruleMm).toBeCloseTo(wedgeThinning(angle(30, 10), 0.15), 12);
    expect(groove(0.1005)).toBeUndefined();
  });

  it('the twelve largest pits are told', () => {
    const traps = Array.from({ length: 15 }, () => ({ ...pit(20, 8, 30), parent: null }));
    expect(part({ traps }).filter(({ rule }) => rule.startsWith('pit'))).toHaveLength(12);
  });
});

describe('life', () => {
  const life = (releaseAgent: 'none' | 'dry-ptfe', changes: object = {}) =>
    estimateLife(
      fillRecipe({ print: { releaseAgent }, run: { pulls: 50 } }),
      {
        heat: {
          contactC: 60,
          peakC: [60],
          limitC: 120,
          pullsBeforeRest: 50,
          transient: { peakC: 60, surfaceC: [60] },
        },
        skin: { sagMm: 0.01, limitMm: 0.05 },
        wallsUnderPressure: { sagMm: 0.01, stressMPa: 1, strengthMPa: 10, collapseBar: null, infill: null },
        draft: { wallMinMacroDeg: 5, wantedDeg: 5 },
        undercut: { maxDepthMm: 0 },
        plan: { arealDrawRatio: 2 },
        ...changes,
      } as unknown as LifeInput,
      40,
      null,
    );

  it('friction of 0.3 bare and 0.15 with a dry film (common practice, no source): 2π E ε t H (μ cos δ − sin δ)', () => {
    // PETG: 1900 MPa, 0.4 %, 0.8 mm over a ratio of 2.
    const hold = 2 * Math.PI * 1900 * 0.004 * 0.4 * 40;
    const rad = (5 * Math.PI) / 180;
    for (const [agent, friction] of [
      ['none', 0.3],
      ['dry-ptfe', 0.15],
    ] as const) {
      // prettier-ignore
      const found = life(agent);
      expect(found.releaseForceN).toBeCloseTo(hold * (friction * Math.cos(rad) - Math.sin(rad)), 9);
      expect(found.selfReleaseDeg).toBeCloseTo((Math.atan(friction) * 180) / Math.PI, 9);
    }
  });

  it('a top that sinks to twice what shows is spoilt by the first pull', () => {
    const pulls = (sagMm: number) => life('none', { skin: { sagMm, limitMm: 0.05 } }).pulls;
    expect([pulls(0.0995), pulls(0.1005)]).toEqual([50, 0]);
  });

  it('an undercut deeper than texture locks the first part: no pull is promised', () => {
    const locked = (maxDepthMm: number) => life('none', { undercut: { maxDepthMm } });
    expect([locked(0.199).pulls, locked(0.201).pulls]).toEqual([50, 0]);
    expect(locked(3).text).toContain('An undercut locks the first part on it');
    expect(locked(3).text).not.toContain('should come through');
  });

  it('what asks for more than there is is not said to be so many times over', () => {
    const { text } = life('none', { skin: { sagMm: 26_000, limitMm: 0.05 } });
    expect(text).toContain('(more than 5 mm asked of 0.05 mm)');
  });

  it('planned pulls hang on the part coming off where the walls have too little draft', () => {
    const at = (wallMinMacroDeg: number) => life('none', { draft: { wallMinMacroDeg, wantedDeg: 5 } }).text;
    expect(at(4.99)).toContain('50 planned pulls, if each part can be drawn off its walls;');
    expect(at(5)).not.toContain('drawn off its walls');
  });

  it('22 templates without a failure would prove 90 % with 90 % confidence (row L10)', () => {
    expect(life('none').text).toContain(' 22 templates that come so far without a failure');
  });

  it('without walls there is nothing to grip: 90° of draft', () => {
    const grip = life('none', { draft: { wallMinMacroDeg: null, wantedDeg: 5 } }).margins.find(({ way }) => way === 'grip'); // prettier-ignore
    expect(grip).toMatchObject({ demand: null, holds: 90, ratio: null });
  });
});

describe('webs', () => {
  const web = (z: number) => {
    const nx = 20;
    const surface = Float64Array.from({ length: nx * nx }, (_, c) => (c % nx >= 5 && c % nx < 15 && c >= 5 * nx && c < 15 * nx ? z : 0)); // prettier-ignore
    const grid = { nx, ny: nx, cell: 1, x0: 0, y0: 0 };
    return estimateWeb({ surface, grid, spacing: [], size: [10, 10, 6] } as never, [40, 40]).outside;
  };

  it('go round what stands higher than 0.05 mm', () => {
    expect(web(0.04975)).toBeNull();
    expect(web(0.05025)).not.toBeNull();
  });

  it('round a square of 10 mm: π times its mean width over 48 directions (Cauchy)', () => {
    let sum = 0;
    for (let k = 0; k < 48; k++) {
      const angle = (Math.PI * k) / 48;
      sum += 10 * (Math.abs(Math.cos(angle)) + Math.sin(angle));
    }
    expect(web(6)?.perimeterMm).toBeCloseTo((Math.PI * sum) / 48, 9);
    expect(web(6)?.gapMm).toBe(15);
  });
});

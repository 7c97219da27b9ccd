import type { Manifold } from 'manifold-3d';
import {
  bore,
  circle,
  draftedLevels,
  flutedCircle,
  footedLevels,
  loft,
  roundedRectangle,
  solids,
  stlBytes,
} from './shapes';

/** The demo templates. Parts, clients and figures are invented. */

const flange = (width: number, depth: number, height: number) =>
  loft(roundedRectangle(width, depth, 10), draftedLevels(height, 10, 2));

async function join(parts: Manifold[]): Promise<Manifold> {
  return (await solids()).Manifold.union(parts);
}

async function cut(body: Manifold, tools: Manifold[]): Promise<Manifold> {
  return (await solids()).Manifold.difference([body, ...tools]);
}

/** Pocket from the top: an upside-down drafted loft whose floor lies `depth` under `top`, rounded into the wall. */
async function pocket(
  radius: number,
  depth: number,
  draftDeg: number,
  top: number,
  floorRadius = 0,
): Promise<Manifold> {
  const draft = (draftDeg * Math.PI) / 180;
  const grow = Math.tan(draft);
  const floor = radius - depth * grow;
  const above = 1;
  const wallFoot = floorRadius * (1 - Math.sin(draft));
  const steps = floorRadius > 0 ? 6 : 0;
  const arc = Array.from({ length: steps + 1 }, (_, i) => {
    const angle = Math.PI / 2 - ((Math.PI / 2 - draft) * i) / Math.max(1, steps);
    return {
      z: top - depth + floorRadius * (1 - Math.sin(angle)),
      inset: floorRadius * (Math.cos(draft) - Math.cos(angle)) - wallFoot * grow,
    };
  });
  return loft(circle(floor), [...arc, { z: top + above, inset: -(depth + above) * grow }]);
}

export type TartTray = { draftDeg: number; ventMm: number; footMm?: number; pitchMm?: number };

/** Six fluted cups on a drafted flange, rounded into it where `footMm` says so; a shallow dish in each is vented to the bed. */
export async function tartTray({
  draftDeg,
  ventMm,
  footMm = 5,
  pitchMm = 84,
}: TartTray): Promise<Uint8Array> {
  const base = 8;
  const height = 27;
  const cups: Manifold[] = [];
  const tools: Manifold[] = [];
  for (const x of [-pitchMm, 0, pitchMm])
    for (const y of [-pitchMm / 2, pitchMm / 2]) {
      const levels =
        footMm > 0 ? footedLevels(base, footMm, height, draftDeg, 2.5) : draftedLevels(height, draftDeg, 2.5);
      cups.push((await loft(flutedCircle(25, 14, 0.03), levels)).translate(x, y, 0));
      tools.push((await pocket(13, 3, 20, height)).translate(x, y, 0), await bore(ventMm, height, x, y));
    }
  const body = await join([await flange(84 + 2 * pitchMm, 84 + pitchMm, base), ...cups]);
  return stlBytes(await cut(body, tools), 'tart tray, six cup');
}

export type BonbonMould = { ventedRows: number; ventMm: number };

/** A block with twenty-four round pockets; rows beyond `ventedRows` have no way out for the air. */
export async function bonbonMould({ ventedRows, ventMm }: BonbonMould): Promise<Uint8Array> {
  const height = 24;
  const block = await loft(roundedRectangle(192, 132, 8), draftedLevels(height, 8, 2));
  const tools: Manifold[] = [];
  for (let row = 0; row < 4; row++)
    for (let column = 0; column < 6; column++) {
      const [x, y] = [-70 + 28 * column, -42 + 28 * row];
      tools.push((await pocket(10, 11, 12, height, 4)).translate(x, y, 0));
      if (row < ventedRows) tools.push(await bore(ventMm, height, x, y));
    }
  return stlBytes(await cut(block, tools), 'bonbon mould, twenty-four');
}

export type GiftCover = { lipMm: number; draftDeg: number };

/** A box cover with a snap lip under its top edge: the lip locks the part on the template. */
export async function giftCover({ lipMm, draftDeg }: GiftCover): Promise<Uint8Array> {
  const height = 36;
  const box = await loft(roundedRectangle(124, 84, 8), draftedLevels(height, draftDeg, 2));
  const parts = [box];
  if (lipMm > 0) {
    const grown = Math.tan((draftDeg * Math.PI) / 180);
    const lip = await loft(roundedRectangle(124 + 2 * lipMm - 40 * grown, 84 + 2 * lipMm - 40 * grown, 8), [
      { z: 20, inset: lipMm },
      { z: 20 + lipMm, inset: 0 },
      { z: 24 + lipMm, inset: 0.4 },
      { z: 26 + 2 * lipMm, inset: lipMm + 1.5 },
    ]);
    parts.push(lip);
  }
  return stlBytes(await join(parts), 'gift box cover');
}

export type SeedlingInsert = { wallMm: number };

/** A thin hollow shell, open at the bed, with four drafted wells. */
export async function seedlingInsert({ wallMm }: SeedlingInsert): Promise<Uint8Array> {
  const height = 30;
  const outside = await loft(roundedRectangle(150, 96, 10), draftedLevels(height, 7, 2));
  const inside = await loft(
    roundedRectangle(150 - 2 * wallMm, 96 - 2 * wallMm, Math.max(2, 10 - wallMm)),
    draftedLevels(height - wallMm, 7, 1.5),
  );
  const shell = await cut(outside, [inside.translate(0, 0, -0.001)]);
  const wells: Manifold[] = [];
  const holes: Manifold[] = [];
  for (const x of [-48, -16, 16, 48]) {
    const post = await loft(circle(11), draftedLevels(height - 0.5, 3, 0.5));
    wells.push(post.translate(x, 0, 0));
    holes.push((await pocket(9, 9, 12, height, 4)).translate(x, 0, 0), await bore(1.2, height, x, 0));
  }
  return stlBytes(await cut(await join([shell, ...wells]), holes), 'seedling insert');
}

/** A cradle with three troughs that run out to both sides: nothing traps air, nothing locks. */
export async function bottleCradle(): Promise<Uint8Array> {
  const { Manifold: Solid } = await solids();
  const height = 26;
  const block = await loft(roundedRectangle(168, 90, 8), draftedLevels(height, 8, 2.5));
  const troughs = [-50, 0, 50].map((x) =>
    Solid.cylinder(200, 17, 17, 96, true)
      .rotate(90, 0, 0)
      .translate(x, 0, height + 5),
  );
  return stlBytes(await cut(block, troughs), 'bottle cradle');
}

import { describe, expect, it } from 'vitest';
import { docketItems } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/docket-items';
import {
  itemOfPin,
  outwardAt,
  stagePins,
  viewOf,
  type Bounds,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/stage-pins';
import { docket, finding } from './fixtures/docket';

const bounds: Bounds = { min: [-90, -60, 0], max: [90, 60, 40] };
const lengthOf = (v: readonly number[]) => Math.hypot(...v);

describe('stagePins', () => {
  const items = docketItems(docket());
  const pins = stagePins(items, bounds, 'mm');

  it('marks pinned threads and the places of findings that are not fine', () => {
    expect(pins.filter((pin) => pin.state === 'must-settle')).toHaveLength(2);
    expect(pins.some((pin) => pin.label === 'Draft 2.4, least 5.0°')).toBe(true);
    expect(pins.every((pin) => items.some((item) => item.key === itemOfPin(pin.id)))).toBe(true);
  });

  it('marks the worst place of a finding, and up to eight of the one that is looked at', () => {
    const places = Array.from({ length: 9 }, (_, i) => ({
      at: [i, i, 5] as [number, number, number],
      areaMm2: 1,
    }));
    const many = docketItems(docket({ findings: [finding({ places })], threads: [] }));
    expect(stagePins(many, bounds, 'mm').map((pin) => pin.at)).toEqual([[0, 0, 5]]);
    expect(stagePins(many, bounds, 'mm', many[0].key)).toHaveLength(8);
  });

  it('marks what is settled or fine only while it is looked at', () => {
    const fine = docketItems(docket({ findings: [finding({ status: 'pass' })], threads: [] }));
    expect(stagePins(fine, bounds, 'mm')).toEqual([]);
    expect(stagePins(fine, bounds, 'mm', fine[0].key).map((pin) => pin.state)).toEqual([
      'settled',
      'settled',
    ]);
  });
});

describe('where the eye goes', () => {
  it('looks outward and up, as a unit vector, also in the very middle', () => {
    for (const at of [
      [50, -30, 10],
      [0, 0, 40],
      [-90, 0, 0],
    ] as [number, number, number][]) {
      const out = outwardAt(at, bounds);
      expect(lengthOf(out)).toBeCloseTo(1, 12);
      expect(out[2]).toBeGreaterThan(0);
      expect(out[0] * at[0] + out[1] * at[1]).toBeGreaterThanOrEqual(0);
    }
  });

  it('aims at the place from outside the part', () => {
    const view = viewOf([50, -30, 10], bounds);
    expect(view.target).toEqual([50, -30, 10]);
    expect(view.position[2]).toBeGreaterThan(bounds.max[2]);
  });
});

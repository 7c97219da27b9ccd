'use client';

import clsx from 'clsx';
import type { SectionWall } from '@/lib/stage-model/find-section-walls';
import { formatLength, formatNumber } from '../format-figure';
import type { Units } from '../preferences';

/** The walls of a section as figures, left to right: for reading, for the keyboard, for a screen reader. */
export function WallTable(props: {
  walls: readonly SectionWall[];
  axis: 'x' | 'y';
  limitDeg: number;
  units: Units;
  active: SectionWall | null;
  onWall: (wall: SectionWall) => void;
}) {
  const { walls, axis, limitDeg, units, active, onWall } = props;
  const along = axis === 'y' ? 'x' : 'y';
  const middle = (wall: SectionWall) => (wall.from[0] + wall.to[0]) / 2;
  const ordered = [...walls].sort((a, b) => middle(a) - middle(b));
  return (
    <details className="border-t border-rule">
      <summary className="cursor-pointer px-3 py-2 text-xs text-slate hover:text-ink sm:px-4 pointer-coarse:py-3.5">
        Walls of this section in figures ({walls.length})
      </summary>
      <div className="overflow-x-auto pb-2">
        <table className="w-full text-left text-sm">
          <thead className="font-mono text-label text-slate uppercase">
            <tr>
              <th className="px-3 py-1 font-normal sm:px-4">Wall at {along}</th>
              <th className="px-3 py-1 text-right font-normal">Draft</th>
              <th className="px-3 py-1 text-right font-normal">From z</th>
              <th className="px-3 py-1 text-right font-normal sm:px-4">To z</th>
            </tr>
          </thead>
          <tbody className="font-mono">
            {ordered.map((wall, i) => {
              const broken = wall.draftDeg < limitDeg;
              const [low, top] = [Math.min(wall.from[1], wall.to[1]), Math.max(wall.from[1], wall.to[1])];
              return (
                <tr key={i} className={clsx('border-t border-rule', wall === active && 'bg-verdigris-wash')}>
                  <td className="px-3 sm:px-4">
                    <button
                      type="button"
                      aria-pressed={wall === active}
                      onClick={() => onWall(wall)}
                      className="py-1.5 text-verdigris underline underline-offset-2"
                    >
                      {formatLength(middle(wall), units, 1)}
                    </button>
                  </td>
                  <td className={clsx('px-3 text-right', broken && 'text-madder')}>
                    {formatNumber(wall.draftDeg, 1)}°
                    <span className="font-sans">
                      {broken ? ` below ${Number(limitDeg.toFixed(1))}°` : ''}
                    </span>
                  </td>
                  <td className="px-3 text-right">{formatLength(low, units, 1)}</td>
                  <td className="px-3 text-right sm:px-4">{formatLength(top, units, 1)}</td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
    </details>
  );
}

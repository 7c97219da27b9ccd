import { renderToStaticMarkup } from 'react-dom/server';
import { beforeAll, describe, expect, it } from 'vitest';
import { DraftLegend, wallAreas } from '@/app/_components/stage/draft-legend';
import { formatArea, formatShare } from '@/app/_components/stage/format-area';
import { addressKey } from '@/app/_components/stage/load-once';
import { Stage } from '@/app/_components/stage/stage';
import { StageFallback } from '@/app/_components/stage/stage-fallback';
import type { StagePin } from '@/app/_components/stage/stage-props';
import { UndercutLegend } from '@/app/_components/stage/undercut-legend';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { frustum, geometryOf } from '../../stage-model/shapes';

const limits: StageLimits = { draftDeg: 5, layerMm: 0.15, stepMm: 0.1, wallMm: 3, sheetMm: 0.35 };
let four: StageModelMeta;
let leaning: StageModelMeta;

beforeAll(async () => {
  four = (await buildStageModel(geometryOf(frustum(60, 30, 4.2)))).meta;
  leaning = (await buildStageModel(geometryOf(frustum(40, 30, -10)))).meta;
});

const words = (markup: string) =>
  markup
    .replace(/<\/?span[^>]*>/g, '')
    .replace(/<[^>]*>/g, ' ')
    .replace(/\s+/g, ' ')
    .trim();

describe('the stage without 3D', () => {
  const pins: StagePin[] = [
    { id: 'p', at: [1, -30, 5], normal: [0, -1, 0], state: 'must-settle', label: 'Wall too steep' },
  ];

  it('says why, shows the picture, the figures that the maps would show, and the pins', () => {
    const markup = renderToStaticMarkup(
      <StageFallback
        title="Cover, revision B"
        pictureUrl="/p.png"
        meta={four}
        limits={limits}
        pins={pins}
        reason="No WebGL."
      />,
    );
    const text = words(markup);
    expect(text).toContain('No WebGL.');
    expect(markup).toContain('alt="Cover, revision B, seen from the front right"');
    expect(text).toContain('60.0 mm × 60.0 mm × 30.0 mm');
    expect(text).toContain('Least draft 4.2° (outside the limit)');
    expect(text).toMatch(/Walls below 5° [\d.]+ cm², 100 % \(outside the limit\)/);
    expect(text).toContain('Undercut area 0 mm² ');
    expect(text).toContain('Wall too steepmust settle, at x 1.0 mm, y −30.0 mm, z 5.0 mm');
  });

  it('marks nothing where nothing is broken', () => {
    const text = words(
      renderToStaticMarkup(
        <StageFallback
          title="T"
          pictureUrl="/p.png"
          meta={four}
          limits={{ ...limits, draftDeg: 4 }}
          reason="No WebGL."
        />,
      ),
    );
    expect(text).not.toContain('outside the limit');
  });

  it('is a picture on the server, whatever the browser will be', () => {
    const markup = renderToStaticMarkup(
      <Stage
        title="T"
        modelUrl="/m.glb"
        pictureUrl="/p.png"
        meta={four}
        map="draft"
        onMapChange={() => {}}
        limits={limits}
      />,
    );
    expect(markup).toContain('src="/p.png"');
    expect(markup).not.toContain('canvas');
  });
});

describe('legends', () => {
  it('state the area below the limit in words as well', () => {
    const markup = renderToStaticMarkup(<DraftLegend meta={four} limitDeg={5} reading={4.2} />);
    const rad = (4.2 * Math.PI) / 180;
    const walls = 4 * (60 - 30 * Math.tan(rad)) * (30 / Math.cos(rad));
    expect(wallAreas(four, 5).walls).toBeCloseTo(walls, 0);
    expect(words(markup)).toContain(
      `${words(formatArea(walls, 'mm'))} of the walls, 100 %, below 5°, hatched`,
    );
    expect(markup).toContain('aria-label="Scale from 0 to 15 degrees of draft. Limit 5 degrees');
  });

  it('count faces that look down as below the limit and as undercut', () => {
    const { walls, below } = wallAreas(leaning, 5);
    expect(below).toBeCloseTo(walls, 6);
    expect(leaning.areaMm2.undercut).toBeCloseTo(walls, 0);
    expect(words(renderToStaticMarkup(<UndercutLegend meta={leaning} />))).toMatch(
      /cm² cannot be seen from above/,
    );
    expect(words(renderToStaticMarkup(<UndercutLegend meta={four} />))).toMatch(
      /No face is hidden from above/,
    );
  });
});

describe('areas and shares', () => {
  it.each([
    [0, '0\u00a0mm²'],
    [0.0456, '0.0456\u00a0mm²'],
    [12.34, '12.3\u00a0mm²'],
    [999, '999\u00a0mm²'],
    [4678, '46.8\u00a0cm²'],
    [123_456, '1235\u00a0cm²'],
  ])('%d mm² reads %s', (mm2, text) => expect(formatArea(mm2, 'mm')).toBe(text));
  it('reads in square inches', () => expect(formatArea(645.16, 'in')).toBe('1.00\u00a0in²'));
  it.each([
    [0, 10, '0.0\u00a0%'],
    [0.001, 10, 'under 0.1\u00a0%'],
    [0.5, 10, '5.0\u00a0%'],
    [9, 10, '90\u00a0%'],
    [1, 0, '0.0\u00a0%'],
  ])('%d of %d is %s', (part, whole, text) => expect(formatShare(part, whole)).toBe(text));
});

describe('addressKey', () => {
  it('sees through a new signature on the same object, and through nothing else', () => {
    const signed = (s: string) => `https://store.example/b/m.glb?X-Amz-Date=${s}&X-Amz-Signature=${s}`;
    expect(addressKey(signed('1'))).toBe(addressKey(signed('2')));
    expect(addressKey('/api/v1/model?revision=a')).not.toBe(addressKey('/api/v1/model?revision=b'));
  });
});

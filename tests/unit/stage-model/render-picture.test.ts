import { inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { cividis, type Rgb } from '@/lib/stage-model/cividis';
import { encodePng } from '@/lib/stage-model/encode-png';
import { MADDER, PAPER } from '@/lib/stage-model/picture-palette';
import { ISOMETRIC_UNDER, viewAxes } from '@/lib/stage-model/rasterise';
import { renderPicture, THUMBNAIL_SIZE } from '@/lib/stage-model/render-picture';
import { frustum, geometryOf } from './shapes';

/** Decodes the 8-bit RGB PNGs written here: Sub and Up rows only. */
function decode(png: Uint8Array) {
  const bytes = Buffer.from(png);
  expect(bytes.subarray(1, 4).toString('latin1')).toBe('PNG');
  const [width, height] = [bytes.readUInt32BE(16), bytes.readUInt32BE(20)];
  const data: Buffer[] = [];
  for (let at = 8; at < bytes.length;) {
    const length = bytes.readUInt32BE(at);
    if (bytes.toString('latin1', at + 4, at + 8) === 'IDAT')
      data.push(bytes.subarray(at + 8, at + 8 + length));
    at += length + 12;
  }
  const raw = inflateSync(Buffer.concat(data));
  const stride = width * 3;
  const rgb = new Uint8Array(stride * height);
  for (let y = 0; y < height; y++) {
    const filter = raw[y * (stride + 1)];
    for (let x = 0; x < stride; x++) {
      const before =
        filter === 1 ? (x >= 3 ? rgb[y * stride + x - 3] : 0) : y > 0 ? rgb[(y - 1) * stride + x] : 0;
      rgb[y * stride + x] = raw[y * (stride + 1) + 1 + x] + before;
    }
  }
  const at = (x: number, y: number) => Array.from(rgb.subarray((y * width + x) * 3, (y * width + x) * 3 + 3));
  return { width, height, at, rgb };
}

const round = (colour: Rgb) => colour.map(Math.round);

describe('renderPicture', () => {
  const good = geometryOf(frustum(60, 30, 8));

  it('stands the template in the middle of the paper', () => {
    const picture = decode(renderPicture(good));
    expect([picture.width, picture.height]).toEqual([1200, 800]);
    for (const [x, y] of [
      [0, 0],
      [1199, 0],
      [0, 799],
      [1199, 799],
      [600, 10],
      [30, 400],
    ] as const) {
      expect(picture.at(x, y)).toEqual(PAPER);
    }
    expect(picture.at(600, 400)).not.toEqual(PAPER);
  });

  it('colours each wall by its draft and leaves the top plain', () => {
    const picture = decode(renderPicture(good, { map: 'draft', limitDeg: 5 }));
    expect(picture.at(600, 250)).toEqual(decode(renderPicture(good)).at(600, 250));
    const wall = round(cividis(8 / 15));
    expect(picture.at(450, 550)).toEqual(wall);
    expect(picture.at(750, 550)).toEqual(wall);
  });

  it('hatches walls below the limit and only those', () => {
    const shares = [4.9, 5.1].map((draft) => {
      const picture = decode(
        renderPicture(geometryOf(frustum(60, 30, draft)), { map: 'draft', limitDeg: 5 }),
      );
      const wall = round(cividis(draft / 15)).join();
      let plain = 0;
      for (let x = 430; x < 470; x++)
        for (let y = 530; y < 570; y++) if (picture.at(x, y).join() === wall) plain++;
      return plain / 1600;
    });
    expect(shares[0]).toBeGreaterThan(0.3);
    expect(shares[0]).toBeLessThan(0.8);
    expect(shares[1]).toBe(1);
  });

  it('strikes undercut faces through in madder, on the plain map too', () => {
    const picture = decode(
      renderPicture(geometryOf(frustum(50, 30, -10)), { view: { azimuthDeg: 45, elevationDeg: 5 } }),
    );
    const sound = decode(renderPicture(good, { view: { azimuthDeg: 45, elevationDeg: 5 } }));
    const count = ({ width, height, at }: typeof picture) => {
      let n = 0;
      for (let y = 0; y < height; y += 2)
        for (let x = 0; x < width; x += 2) if (at(x, y).join() === MADDER.join()) n++;
      return n;
    };
    expect(count(picture)).toBeGreaterThan(1000);
    expect(count(sound)).toBe(0);
  });

  it('draws an outline around the body', () => {
    const { at } = decode(renderPicture(good));
    const row = Array.from({ length: 1200 }, (_, x) => at(x, 500).reduce((a, b) => a + b));
    const first = row.findIndex((v) => v < 700);
    const darkest = Math.min(...row.slice(first, first + 3));
    expect(darkest).toBeLessThan(Math.min(row[first + 8], row[first + 12]) - 120);
  });

  it('is the same to the byte each time, and small for lists', () => {
    expect(Buffer.from(renderPicture(good)).equals(Buffer.from(renderPicture(good)))).toBe(true);
    const small = renderPicture(good, THUMBNAIL_SIZE);
    expect(decode(small).width).toBe(320);
    expect(small.length).toBeLessThan(20_000);
  });

  it('sees the bed side from below', () => {
    // From below the wide bed face fills the lower part; from above the smaller top fills the upper.
    const [above, below] = [{}, { view: ISOMETRIC_UNDER }].map((o) => decode(renderPicture(good, o)));
    const broad = ({ at }: typeof above, y: number) => {
      const tone = at(600, y).join();
      let n = 0;
      for (let i = 0; i < 1200; i += 2) for (let j = 0; j < 800; j += 2) if (at(i, j).join() === tone) n++;
      return n;
    };
    const ratio = broad(below, 550) / broad(above, 250);
    const [top, bed] = [(60 - 60 * Math.tan((8 * Math.PI) / 180)) ** 2, 60 ** 2];
    expect(ratio).toBeGreaterThan((bed / top) * 0.8);
    expect(ratio).toBeLessThan((bed / top) * 1.25);
  });

  it('refuses an empty mesh in words', () => {
    expect(() => renderPicture(geometryOf(new Float32Array(0)))).toThrow(/no triangle/);
  });
});

describe('viewAxes', () => {
  it.each([
    [0, 0],
    [45, 35.264],
    [130, -60],
    [270, 90],
  ])('is a right-handed frame at azimuth %d, elevation %d', (azimuthDeg, elevationDeg) => {
    const { right, up, toEye } = viewAxes({ azimuthDeg, elevationDeg });
    const dot = (a: number[], b: number[]) => a.reduce((s, v, i) => s + v * b[i], 0);
    const cross = [
      right[1] * up[2] - right[2] * up[1],
      right[2] * up[0] - right[0] * up[2],
      right[0] * up[1] - right[1] * up[0],
    ];
    expect(dot(right, up)).toBeCloseTo(0, 12);
    cross.forEach((v, i) => expect(v).toBeCloseTo(toEye[i], 12));
  });
  it('looks from the front with x to the right, and shortens the three axes alike in the isometric view', () => {
    expect(viewAxes({ azimuthDeg: 0, elevationDeg: 0 }).toEye[1]).toBe(-1);
    expect(viewAxes({ azimuthDeg: 0, elevationDeg: 0 }).right[0]).toBe(1);
    const { toEye } = viewAxes({ azimuthDeg: 45, elevationDeg: 35.264 });
    for (const c of toEye) expect(Math.abs(c)).toBeCloseTo(1 / Math.sqrt(3), 4);
  });
});

describe('encodePng', () => {
  it('keeps every byte', () => {
    const rgb = Uint8Array.from({ length: 7 * 5 * 3 }, (_, i) => (i * 37 + (i >> 3) * 91) & 255);
    expect(Array.from(decode(encodePng(rgb, 7, 5)).rgb)).toEqual(Array.from(rgb));
  });
  it('says what is wrong when the bytes do not fit the size', () => {
    expect(() => encodePng(new Uint8Array(10), 2, 2)).toThrow(/needs 12 bytes, 10 were given/);
  });
});

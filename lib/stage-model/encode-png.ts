import { crc32, deflateSync } from 'node:zlib';

const SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

/** 8-bit RGB (three bytes a pixel, rows from the top) as PNG; source: W3C PNG specification, third edition. */
export function encodePng(rgb: Uint8Array, width: number, height: number): Uint8Array {
  if (rgb.length !== width * height * 3) {
    throw new RangeError(
      `A ${width} x ${height} picture needs ${width * height * 3} bytes, ${rgb.length} were given.`,
    );
  }
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([8, 2, 0, 0, 0], 8);
  const data = deflateSync(filterRows(rgb, width, height), { level: 9 });
  return Buffer.concat([
    Buffer.from(SIGNATURE),
    chunk('IHDR', header),
    chunk('IDAT', data),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

function chunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const out = Buffer.alloc(body.length + 8);
  out.writeUInt32BE(data.length, 0);
  body.copy(out, 4);
  out.writeUInt32BE(crc32(body), body.length + 4);
  return out;
}

/** Sub or Up, whichever leaves the smaller sum of differences in the row (the specification's own advice). */
function filterRows(rgb: Uint8Array, width: number, height: number): Buffer {
  const stride = width * 3;
  const out = Buffer.alloc((stride + 1) * height);
  for (let y = 0; y < height; y++) {
    const row = y * stride;
    let sub = 0;
    let up = 0;
    for (let x = 0; x < stride; x++) {
      const s = (rgb[row + x] - (x >= 3 ? rgb[row + x - 3] : 0)) & 255;
      const u = (rgb[row + x] - (y > 0 ? rgb[row + x - stride] : 0)) & 255;
      sub += s < 128 ? s : 256 - s;
      up += u < 128 ? u : 256 - u;
    }
    const useUp = up < sub;
    const to = y * (stride + 1);
    out[to] = useUp ? 2 : 1;
    for (let x = 0; x < stride; x++) {
      const before = useUp ? (y > 0 ? rgb[row + x - stride] : 0) : x >= 3 ? rgb[row + x - 3] : 0;
      out[to + 1 + x] = (rgb[row + x] - before) & 255;
    }
  }
  return out;
}

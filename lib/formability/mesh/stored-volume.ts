/**
 * Signed volume by the divergence theorem over the triangles as stored, in the file's own unit cubed. It is summed
 * from the first corner, so that a closed mesh far from the origin keeps its digits; where edges are left over, the
 * sum hangs on the point it is taken from, and that is the file's origin.
 * @param coords 9 per triangle
 * @param closed every edge is used as often in one direction as in the other
 */
export function storedVolume(coords: Float32Array, closed: boolean): number {
  const [rx, ry, rz] = coords;
  let six = 0;
  let [sx, sy, sz] = [0, 0, 0];
  for (let i = 0; i < coords.length; i += 9) {
    const ax = coords[i] - rx;
    const ay = coords[i + 1] - ry;
    const az = coords[i + 2] - rz;
    const bx = coords[i + 3] - rx;
    const by = coords[i + 4] - ry;
    const bz = coords[i + 5] - rz;
    const cx = coords[i + 6] - rx;
    const cy = coords[i + 7] - ry;
    const cz = coords[i + 8] - rz;
    six += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
    if (closed) continue;
    sx += (by - ay) * (cz - az) - (bz - az) * (cy - ay);
    sy += (bz - az) * (cx - ax) - (bx - ax) * (cz - az);
    sz += (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);
  }
  return (six + rx * sx + ry * sy + rz * sz) / 6;
}

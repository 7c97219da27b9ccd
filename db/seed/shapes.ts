import Module, { type Manifold, type ManifoldToplevel } from 'manifold-3d';

/** Solids of the demo templates, made from a few loops and lofts. All lengths in mm, all angles in degrees. */

let kernel: ManifoldToplevel | undefined;

/** The solid kernel (WebAssembly that ships inside its package), loaded once. */
export async function solids(): Promise<ManifoldToplevel> {
  if (!kernel) {
    kernel = await Module();
    kernel.setup();
  }
  return kernel;
}

type Loop = [number, number][];
/** One level of a loft: its height and how far its outline has moved inwards from the base outline. */
type Level = { z: number; inset: number };

/** Rectangle with rounded corners around the origin, counter-clockwise. */
export function roundedRectangle(width: number, depth: number, radius: number, perCorner = 12): Loop {
  const loop: Loop = [];
  const corners = [
    [1, 1, 0],
    [-1, 1, 90],
    [-1, -1, 180],
    [1, -1, 270],
  ];
  for (const [sx, sy, start] of corners)
    for (let i = 0; i <= perCorner; i++) {
      const angle = ((start + (90 * i) / perCorner) * Math.PI) / 180;
      loop.push([
        sx * (width / 2 - radius) + radius * Math.cos(angle),
        sy * (depth / 2 - radius) + radius * Math.sin(angle),
      ]);
    }
  return loop;
}

/** Fluted circle: `flutes` waves of the given share of the radius. */
export function flutedCircle(radius: number, flutes: number, share: number, points = 240): Loop {
  return Array.from({ length: points }, (_, i) => {
    const angle = (2 * Math.PI * i) / points;
    const r = radius * (1 + share * Math.cos(flutes * angle));
    return [r * Math.cos(angle), r * Math.sin(angle)] as [number, number];
  });
}

export const circle = (radius: number, points = 96): Loop => flutedCircle(radius, 1, 0, points);

/** Heights and insets of a wall with the given draft that ends in a rounded top edge. */
export function draftedLevels(height: number, draftDeg: number, topRadius: number, steps = 6): Level[] {
  const draft = (draftDeg * Math.PI) / 180;
  // The arc is tangent to the wall and to the top: it starts where the wall stands `topRadius` under it.
  const wallTop = height - topRadius * (1 - Math.sin(draft));
  const levels: Level[] = [{ z: 0, inset: 0 }];
  for (let i = 0; i <= steps; i++) {
    const angle = draft + ((Math.PI / 2 - draft) * i) / steps;
    levels.push({
      z: wallTop + topRadius * (Math.sin(angle) - Math.sin(draft)),
      inset: wallTop * Math.tan(draft) + topRadius * (Math.cos(draft) - Math.cos(angle)),
    });
  }
  return levels;
}

/**
 * The same wall standing on a floor at `floor`, with a rounded inside corner there: the arc is tangent to floor and
 * wall, so the outline is widest on the floor.
 */
export function footedLevels(
  floor: number,
  footRadius: number,
  height: number,
  draftDeg: number,
  topRadius: number,
  steps = 6,
): Level[] {
  const draft = (draftDeg * Math.PI) / 180;
  const wallFoot = floor + footRadius * (1 - Math.sin(draft));
  const arc = Array.from({ length: steps + 1 }, (_, i): Level => {
    const angle = Math.PI / 2 - ((Math.PI / 2 - draft) * i) / steps;
    return {
      z: floor + footRadius * (1 - Math.sin(angle)),
      inset: wallFoot * Math.tan(draft) - footRadius * (Math.cos(draft) - Math.cos(angle)),
    };
  });
  return [{ ...arc[0], z: 0 }, ...arc, ...draftedLevels(height, draftDeg, topRadius, steps).slice(1)];
}

/** Solid between outlines that shrink by scaling, so that straight walls have exactly the draft of the levels. */
export async function loft(loop: Loop, levels: Level[]): Promise<Manifold> {
  const { Manifold: Solid, Mesh } = await solids();
  const halfX = Math.max(...loop.map(([x]) => x));
  const halfY = Math.max(...loop.map(([, y]) => y));
  const n = loop.length;
  const vertices: number[] = [];
  for (const { z, inset } of levels)
    for (const [x, y] of loop) vertices.push((x * (halfX - inset)) / halfX, (y * (halfY - inset)) / halfY, z);
  const bottom = levels.length * n;
  vertices.push(0, 0, levels[0].z, 0, 0, levels[levels.length - 1].z);
  const triangles: number[] = [];
  for (let level = 0; level + 1 < levels.length; level++)
    for (let i = 0; i < n; i++) {
      const a = level * n + i;
      const b = level * n + ((i + 1) % n);
      triangles.push(a, b, b + n, a, b + n, a + n);
    }
  const top = (levels.length - 1) * n;
  for (let i = 0; i < n; i++) {
    triangles.push(bottom, (i + 1) % n, i);
    triangles.push(bottom + 1, top + i, top + ((i + 1) % n));
  }
  const mesh = new Mesh({
    numProp: 3,
    vertProperties: Float32Array.from(vertices),
    triVerts: Uint32Array.from(triangles),
  });
  return Solid.ofMesh(mesh);
}

/** Straight bore from below the bed to above `height`. */
export async function bore(diameter: number, height: number, x: number, y: number): Promise<Manifold> {
  const { Manifold: Solid } = await solids();
  return Solid.cylinder(height + 2, diameter / 2, diameter / 2, 32).translate(x, y, -1);
}

/** Binary STL: 80-byte header, count, then normal, three vertices and an attribute word for each facet. */
export function stlBytes(solid: Manifold, header: string): Uint8Array {
  const mesh = solid.getMesh();
  const count = mesh.numTri;
  const bytes = new Uint8Array(84 + 50 * count);
  bytes.set(new TextEncoder().encode(header.slice(0, 79)), 0);
  const view = new DataView(bytes.buffer);
  view.setUint32(80, count, true);
  const at = (v: number, axis: number) => mesh.vertProperties[v * mesh.numProp + axis];
  for (let t = 0; t < count; t++) {
    const [a, b, c] = [mesh.triVerts[3 * t], mesh.triVerts[3 * t + 1], mesh.triVerts[3 * t + 2]];
    const u = [0, 1, 2].map((axis) => at(b, axis) - at(a, axis));
    const v = [0, 1, 2].map((axis) => at(c, axis) - at(a, axis));
    const normal = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
    const length = Math.hypot(...normal) || 1;
    const numbers = [
      ...normal.map((k) => k / length),
      ...[a, b, c].flatMap((vertex) => [0, 1, 2].map((axis) => at(vertex, axis))),
    ];
    numbers.forEach((k, i) => view.setFloat32(84 + 50 * t + 4 * i, k, true));
  }
  return bytes;
}

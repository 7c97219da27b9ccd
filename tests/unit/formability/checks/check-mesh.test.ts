import { describe, expect, it } from 'vitest';
import { box, frustum } from '../../../fixtures/meshes/solids';
import { flipped, mapPoints, moved, reordered, scaled, together, type Triangles } from '../../../fixtures/meshes/triangles'; // prettier-ignore
import { checkOf, reportOn } from '../run-engine';

const check = (mesh: Triangles, recipe = {}) =>
  checkOf(reportOn(mesh, { grid: { cellMm: 2 }, ...recipe }), 'mesh');
const without = (mesh: Triangles, gone: number) =>
  reordered(
    mesh,
    Array.from({ length: mesh.length / 9 }, (_, i) => i).filter((i) => i !== gone),
  );

describe('the mesh check in a designer’s words', () => {
  const part = box(60, 40, 20);

  it('has nothing to say of a sound part', () => {
    expect(check(part)).toMatchObject({ status: 'pass', measured: 0, remedy: '', places: [] });
    expect(check(part).message).toBe('The mesh is closed, faces outward and stands on the bed.');
  });

  it('a hole fails: how many edges, how wide, where, what was done, what to do', () => {
    const { status, message, remedy, places } = check(without(part, 2));
    expect(status).toBe('fail');
    expect(message).toContain('open along 3 edges, the widest gap 72.11 mm across');
    expect(message).toContain('holes were closed with flat caps');
    expect(message).toContain('estimates until the surface is closed');
    expect(remedy).toBe('In the model: close the surface.');
    expect(places).toHaveLength(1);
    expect(places[0].at[2]).toBe(20);
  });

  it('what was mended whole is a caution, what was left out a note', () => {
    expect(check(flipped(part))).toMatchObject({ status: 'caution', measured: 1 });
    expect(check(flipped(part)).message).toContain('one body was inside out');
    const note = check(together(part, [0, 0, 20, 0, 0, 20, 5, 5, 20]));
    expect(note).toMatchObject({ status: 'pass', measured: 0 });
    expect(note.message).toContain('Noted: one facet has no area');
  });

  it('names the place of bodies that overlap, touch or hang in the air', () => {
    expect(check(together(part, moved(box(10, 10, 10), 0, 0, 15))).message).toMatch(
      /bodies overlap.*first at x 0, y 0, z/,
    );
    expect(check(together(part, moved(box(10, 10, 10), 5, 0, 20))).message).toMatch(
      /touch without being joined \(first at x [45]/,
    );
    const high = check(together(part, moved(box(10, 10, 10), 5, 6, 25)));
    expect(high.status).toBe('fail');
    expect(high.message).toContain('one body hangs in the air (first at x 5, y 6, z 30 mm)');
    expect(high.places).toEqual([{ at: [5, 6, 30], areaMm2: 0 }]);
  });

  it('a part off the bed is set down and passes; one that may not be set down fails', () => {
    const low = check(moved(part, 0, 0, -3.25));
    expect(low.status).toBe('pass');
    expect(low.message).toContain('the file has the part 3.25 mm below the bed');
    expect(low.remedy).toBe('');
    const left = check(moved(part, 0, 0, -3.25), { mesh: { dropToBed: false } });
    expect(left.status).toBe('fail');
    expect(left.remedy).toContain('raise it');
  });

  it('a body in the air is not excused by the drop of the whole', () => {
    const both = check(moved(together(part, moved(box(10, 10, 10), 0, 0, 25)), 0, 0, 7));
    expect(both.status).toBe('fail');
    expect(both.message).toContain('in the air');
  });

  it('gives the scale and the direction that would be right', () => {
    expect(check(scaled(part, 1 / 25.4), { grid: {} }).remedy).toContain('scale by 25.4');
    const lying = mapPoints(frustum(100, 80, 40, 5), (x, y, z) => [x, -z, y]);
    expect(check(lying).remedy).toContain('stand it with the direction 0, -1, 0 up');
  });

  it('tells the gravest first', () => {
    const { message } = check(
      together(without(part, 2), moved(box(10, 10, 10), 60, 0, 0), moved(box(10, 10, 10), 65, 0, 0)),
    );
    expect(message.indexOf('open along')).toBeLessThan(message.indexOf('bodies overlap'));
  });
});

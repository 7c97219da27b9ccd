/**
 * Thickness by gauge on a long vertical wall of height H at a gap g from the clamp, floor at the clamp's level, no
 * slip. In plane strain the free strip has one tension, hence one thickness; it is an arc tangent to the wall, then to
 * wall and floor, and what it lays down it loses: d(t ℓ) = t dy, then t ~ ρ^(4/π − 1). Derived here, no source; exact
 * for any law of the sheet.
 * @returns thickness at a height on the wall, and at the same distance from the wall on the floor below g
 */
export function ridgeLaw(gap: number, height: number): (distance: number) => number {
  const arc = (y: number) => {
    const radius = (gap * gap + y * y) / (2 * gap);
    return radius * Math.atan2(y, radius - gap);
  };
  const steps = 20_000;
  const falls = new Float64Array(steps + 1);
  falls[0] = gap / arc(height);
  const at = (k: number) => height + ((gap - height) * k) / steps;
  for (let k = 0; k < steps; k++) {
    const dy = at(k + 1) - at(k);
    falls[k + 1] = falls[k] * Math.exp((dy - (arc(at(k + 1)) - arc(at(k)))) / arc((at(k) + at(k + 1)) / 2));
  }
  return (distance) => {
    if (distance <= gap) return falls[steps] * (distance / gap) ** (4 / Math.PI - 1);
    return falls[Math.round(((height - distance) / (height - gap)) * steps)];
  };
}

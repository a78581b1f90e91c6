/** A point of an SVG drawing at `angleDeg`, counter-clockwise from the right as a reader sees it. SVG's y grows downwards. */
export function polar(radius: number, angleDeg: number): readonly [x: number, y: number] {
  const angle = (angleDeg * Math.PI) / 180;
  return [radius * Math.cos(angle), -radius * Math.sin(angle)];
}

const digits = (value: number): string => String(Number(value.toFixed(2)));

/** `x y` for a path. */
export function polarText(radius: number, angleDeg: number): string {
  const [x, y] = polar(radius, angleDeg);
  return `${digits(x)} ${digits(y)}`;
}

/** A radial line from one radius to another. */
export function radial(inner: number, outer: number, angleDeg: number): string {
  return `M${polarText(inner, angleDeg)}L${polarText(outer, angleDeg)}`;
}

/** An arc from `startDeg` by `sweepDeg`, counter-clockwise positive, up to a full turn either way. */
export function arc(radius: number, startDeg: number, sweepDeg: number): string {
  const large = Math.abs(sweepDeg) > 180 ? 1 : 0;
  const flag = sweepDeg > 0 ? 0 : 1;
  return `M${polarText(radius, startDeg)}A${digits(radius)} ${digits(radius)} 0 ${large} ${flag} ${polarText(radius, startDeg + sweepDeg)}`;
}

/** A filled arrowhead with its tip at a point, pointing along `headingDeg`. */
export function arrowhead(
  tip: readonly [number, number],
  headingDeg: number,
  length: number,
  width: number,
): string {
  const back = polar(length, headingDeg + 180);
  const side = polar(width / 2, headingDeg + 90);
  const [x, y] = tip;
  const corner = (sign: number): string =>
    `${digits(x + back[0] + sign * side[0])} ${digits(y + back[1] + sign * side[1])}`;
  return `M${digits(x)} ${digits(y)}L${corner(1)}L${corner(-1)}Z`;
}

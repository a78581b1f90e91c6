/*
 * The cone |S| ≤ S0 of physical light in coordinates that turn with S: u = S0 − |S|, v = S0 + |S| and two directions across.
 * There S0² − |S|² is u v − across².
 */

/** |s⃗| − s0 of a covector on (u, v, across, across): how far it is outside the dual cone; negative inside. */
export function coneExcess(covector: Float64Array): number {
  const onU = covector[0] ?? 0;
  const onV = covector[1] ?? 0;
  const a2 = covector[2] ?? 0;
  const a3 = covector[3] ?? 0;
  const across = a2 * a2 + a3 * a3;
  const s0 = onU + onV;
  const length = Math.sqrt((onV - onU) * (onV - onU) + across);
  // Of two near equals, their squares' difference keeps its digits.
  return s0 > 0 ? (across - 4 * onU * onV) / (length + s0) : length - s0;
}

/** The length at which y + length · x leaves the cone, `across` being the squared part of x across; Infinity if never. */
export function longestStep(u: number, v: number, x0: number, x1: number, across: number): number {
  // u v + b t + a t² = 0, the smallest root above 0.
  const a = x0 * x1 - across;
  const b = u * x1 + v * x0;
  const c = u * v;
  const below = b * b - 4 * a * c;
  if (below < 0 || (a >= 0 && b >= 0)) return Infinity;
  return (2 * c) / (Math.sqrt(below) - b);
}

/** Turns the frame (S's unit vector, then two across, rows first) to S = along · first + a2 · second + a3 · third. */
export function turnFrame(frame: Float64Array, along: number, a2: number, a3: number): void {
  const s1 = along * (frame[0] ?? 0) + a2 * (frame[3] ?? 0) + a3 * (frame[6] ?? 0);
  const s2 = along * (frame[1] ?? 0) + a2 * (frame[4] ?? 0) + a3 * (frame[7] ?? 0);
  const s3 = along * (frame[2] ?? 0) + a2 * (frame[5] ?? 0) + a3 * (frame[8] ?? 0);
  const size = Math.sqrt(s1 * s1 + s2 * s2 + s3 * s3);
  const n1 = s1 / size;
  const n2 = s2 / size;
  const n3 = s3 / size;
  // Any two across will do. These are continuous but at one pole and need no branch: Duff and others, Building an orthonormal
  // basis, revisited, J. Comput. Graph. Tech. 6 (2017), from memory.
  const sign = n3 >= 0 ? 1 : -1;
  const a = -1 / (sign + n3);
  const b = n1 * n2 * a;
  frame[0] = n1;
  frame[1] = n2;
  frame[2] = n3;
  frame[3] = 1 + sign * n1 * n1 * a;
  frame[4] = sign * b;
  frame[5] = -sign * n1;
  frame[6] = b;
  frame[7] = sign + n2 * n2 * a;
  frame[8] = -n2;
}

import { describe, expect, it } from 'vitest';
import {
  type Convention,
  muellerMatrix,
  parseUnitary,
  radians,
  retarderQuaternion,
  showMueller,
} from '../../../shared/optics';
import { turnOf } from '../../../src/features/quick-angles/turn-of';

const everyConvention: readonly Convention[] = (['kz-wt', 'wt-kz'] as const).flatMap((phase) =>
  (['receiver', 'source'] as const).flatMap((handedness) =>
    (['R', 'L'] as const).map((s3Sign) => ({ phase, handedness, s3Sign })),
  ),
);

/** The right-handed turn by α about the unit vector n: cos α 1 + sin α [n]× + (1 − cos α) n nᵀ (Rodrigues). */
function rightHanded([a, b, c]: readonly [number, number, number], angleRad: number): number[][] {
  const [cos, sin, rest] = [Math.cos(angleRad), Math.sin(angleRad), 1 - Math.cos(angleRad)];
  return [
    [cos + rest * a * a, rest * a * b - sin * c, rest * a * c + sin * b],
    [rest * a * b + sin * c, cos + rest * b * b, rest * b * c - sin * a],
    [rest * a * c - sin * b, rest * b * c + sin * a, cos + rest * c * c],
  ];
}

describe.each(
  everyConvention.map((how) => [`${how.phase} ${how.handedness} +S3 is ${how.s3Sign}`, how] as const),
)('the turn that a page of %s says', (_, convention) => {
  it.each([
    ['quarter-wave at 30°', Math.PI / 2, Math.PI / 6],
    ['a third of a wave at −20°', (2 * Math.PI) / 3, -Math.PI / 9],
    ['0.8 of a wave at 75°', 1.6 * Math.PI, (5 * Math.PI) / 12],
  ])('is what that convention’s Mueller matrix does: %s', (_name, retardance, fastAxis) => {
    const plate = { retardanceRad: radians(retardance), fastAxisRad: radians(fastAxis) };
    const turn = turnOf(retarderQuaternion(plate), convention);
    if (turn === null) throw new Error('it turns');
    const said = rightHanded(turn.axis, turn.angleRad);
    const shown = showMueller(muellerMatrix(plate), convention)
      .rows.slice(1)
      .map((row) => row.slice(1));
    said.forEach((row, i) =>
      row.forEach((value, j) => expect(value).toBeCloseTo(shown[i]?.[j] ?? Number.NaN, 12)),
    );
  });

  it('about the circular states takes H towards D, whatever sign S3 has', () => {
    // exp(−iα/2 σy): H goes to D, which no mirror of S3 touches.
    const read = parseUnitary('rotate(y, 50deg)', { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' });
    if (!read.ok) throw new Error(read.error.message);
    const turn = turnOf(read.quaternion, convention);
    if (turn === null) throw new Error('it turns');
    const [first] = rightHanded(turn.axis, turn.angleRad).map((row) => row[0] ?? Number.NaN);
    const second = rightHanded(turn.axis, turn.angleRad)[1]?.[0];
    expect(first).toBeCloseTo(Math.cos((50 * Math.PI) / 180), 12);
    expect(second).toBeCloseTo(Math.sin((50 * Math.PI) / 180), 12);
  });
});

import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import { freeze } from '../../shared/protocol/freeze';
import { openQuestionRisks } from '../../shared/protocol/open-question-risk';
import type { OpenQuestion } from '../../shared/schemas/calibrations';
import type { VersionContent } from '../../shared/schemas/versions';
import { bench, draft, plate, target } from '../support/plates';

/** A version of these states on an ideal half-wave and quarter-wave plate, the second with a question left open. */
function version(expressions: readonly string[], openQuestions: OpenQuestion[]): VersionContent {
  const half = plate({ calibration: { retardanceDeg: 180, offsetDeg: 0 }, mount: { resolutionDeg: 0.001 } });
  const quarter = plate({
    name: 'Q-1',
    kind: 'quarter',
    mount: { resolutionDeg: 0.001 },
    calibration: { retardanceDeg: 90, retardanceSigmaDeg: 3, offsetDeg: 30, openQuestions },
  });
  const frozen = freeze({
    lab: { id: half.id, name: 'A lab', convention: DEFAULT_CONVENTION },
    protocolId: half.id,
    draft: draft({
      targets: expressions.map((expression, k) => target({ label: `t${k + 1}`, expression })),
    }),
    bench: bench({ plates: [half, quarter] }),
    number: 1,
    parentHash: null,
    message: 'First.',
    savedAt: new Date('2026-11-02T09:00:00Z'),
    savedBy: { id: half.id, name: 'Someone' },
  });
  if (!frozen.ok) throw new Error(frozen.faults.map(({ message }) => message).join(' '));
  return frozen.content;
}

test('with the axes of a quarter-wave plate swapped, circular light comes out as the other hand: nothing of it is right', () => {
  const [risk, ...others] = openQuestionRisks(version(['R', 'L'], ['axis']));
  expect(others).toEqual([]);
  expect(risk).toMatchObject({ plateName: 'Q-1', question: 'axis', lostCount: 2 });
  expect(risk?.worst.infidelity).toBeCloseTo(1, 8);
});

test('linear light whose axis lies along the plate’s does not depend on which axis is the fast one', () => {
  expect(openQuestionRisks(version(['H', '(H + V)/sqrt(2)'], ['axis', 'branch']))).toEqual([]);
});

test('of several targets the one that would suffer most is named, and only those that would be lost are counted', () => {
  const risk = openQuestionRisks(version(['H', 'ellipse(0deg, 3deg)', 'R'], ['branch'])).at(0);
  expect(risk).toMatchObject({ question: 'branch', lostCount: 2, worst: { label: 't3' } });
});

test('an elliptical state of ellipticity χ becomes −χ: 1 − F is sin² 2χ', () => {
  const risk = openQuestionRisks(version(['ellipse(20deg, 10deg)'], ['axis'])).at(0);
  expect(risk?.worst.infidelity).toBeCloseTo(Math.sin((20 * Math.PI) / 180) ** 2, 5);
});

test('a blind retardance is tried at twice its σ', () => {
  const risk = openQuestionRisks(version(['R'], ['blind'])).at(0);
  // A quarter-wave plate that is 6° off: the state is 6° from the pole.
  expect(risk?.worst.infidelity).toBeCloseTo(Math.sin((3 * Math.PI) / 180) ** 2, 6);
});

test('what nobody left open is no risk', () => {
  expect(openQuestionRisks(version(['R', 'L'], []))).toEqual([]);
});

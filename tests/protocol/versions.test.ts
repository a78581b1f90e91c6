import fc from 'fast-check';
import { expect, test } from 'vitest';
import { canonicalJson, contentHash } from '../../shared/protocol/canonical-json';
import { compareShown } from '../../shared/protocol/compare-shown';
import { dialledInfidelity } from '../../shared/protocol/dialled';
import { freeze, type FreezeInput } from '../../shared/protocol/freeze';
import { verifyChain } from '../../shared/protocol/verify';
import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import { versionContentSchema } from '../../shared/schemas';
import { bench, draft, idsFrom, plate as anyPlate, target } from '../support/plates';

const id = idsFrom('00000000');

const plate = (last: number, name: string, retardanceDeg: number, offsetDeg: number, direction: 1 | -1) =>
  anyPlate({
    id: id(last),
    name,
    kind: retardanceDeg > 120 ? 'half' : 'quarter',
    designWavelengthNm: 808,
    mount: { name: `M ${name}`, direction, repeatabilityDeg: 0.06 },
    calibration: { id: id(last + 100), retardanceDeg, offsetDeg },
  });

function input(
  change: Partial<FreezeInput> = {},
  expressions: readonly string[] = ['H', '(H + i V)/sqrt(2)'],
): FreezeInput {
  return {
    lab: { id: id(1), name: 'A lab', convention: DEFAULT_CONVENTION },
    protocolId: id(2),
    draft: draft({
      benchId: id(3),
      targets: expressions.map((expression, index) =>
        target({ id: id(10 + index), label: `t${index + 1}`, expression }),
      ),
    }),
    bench: bench({
      id: id(3),
      hazardWavelengthsNm: [405, 810],
      plates: [plate(20, 'H-3', 179.2, 12.4, 1), plate(21, 'Q-B', 86.9, 301.73, -1)],
    }),
    number: 1,
    parentHash: null,
    message: 'First.',
    savedAt: new Date('2026-06-16T10:42:07Z'),
    savedBy: { id: id(4), name: 'Someone' },
    ...change,
  };
}

function frozen(from: FreezeInput) {
  const result = freeze(from);
  if (!result.ok) throw new Error(result.faults.map(({ message }) => message).join(' '));
  return result;
}

function shownOf(from: FreezeInput) {
  return frozen(from).content.targets.map((target) => {
    const solution = target.solutions[target.chosenSolution];
    if (solution === undefined) throw new Error('a frozen target has its chosen solution');
    const { fastAxesDeg, dialsDeg, infidelity, dialledInfidelity: dialled } = solution;
    return { targetId: target.id, fastAxesDeg, dialsDeg, infidelity, dialledInfidelity: dialled };
  });
}

test('freezing the same draft twice gives the same text to the last byte, and it reads back by its schema', () => {
  const [one, two] = [frozen(input()), frozen(input())];
  expect(one.canonicalJson).toBe(two.canonicalJson);
  expect(one.contentHash).toBe(contentHash(one.canonicalJson));
  const back = versionContentSchema.parse(JSON.parse(one.canonicalJson));
  expect(canonicalJson(back)).toBe(one.canonicalJson);
});

test('whatever of a draft, bench or plate changes, the hash changes', () => {
  const hash = frozen(input()).contentHash;
  const { draft, bench } = input();
  const changed: Partial<FreezeInput>[] = [
    { number: 2 },
    { parentHash: 'a'.repeat(64) },
    { message: 'Second.' },
    { savedAt: new Date('2026-06-16T10:42:08Z') },
    { draft: { ...draft, toleranceInfidelity: 2e-3 } },
    { draft: { ...draft, targets: draft.targets.toReversed() } },
    { bench: { ...bench, laserClass: null } },
    { bench: { ...bench, plates: bench.plates.toReversed() } },
    { lab: { id: id(1), name: 'A lab', convention: { ...DEFAULT_CONVENTION, s3Sign: 'R' } } },
  ];
  const hashes = changed.map((change) => frozen(input(change)).contentHash);
  expect(new Set([hash, ...hashes]).size).toBe(changed.length + 1);
});

test('every row that cannot be read is named by number, label and column, and nothing is frozen', () => {
  const result = freeze(input({}, ['H', 'cos(22.5) H', 'nonsense', '\ud800']));
  expect(result.ok).toBe(false);
  if (result.ok) return;
  expect(result.faults.map(({ path }) => path)).toEqual([
    'targets.1.expression',
    'targets.2.expression',
    'targets.3.expression',
  ]);
  expect(result.faults[0]?.message).toMatch(/^Row 2 \(t2\), column 5: /);
});

test('an unreadable input of the bench and an empty protocol are faults of their own', () => {
  const { bench, draft } = input();
  expect(freeze(input({ bench: { ...bench, inputExpression: '(' } }))).toMatchObject({
    ok: false,
    faults: [{ path: 'benchId' }],
  });
  expect(freeze(input({ draft: { ...draft, targets: [] } }))).toMatchObject({
    ok: false,
    faults: [{ path: 'targets' }],
  });
});

test('what the page showed is accepted as it was and refused at the smallest change', () => {
  const { content } = frozen(input());
  const shown = shownOf(input());
  expect(compareShown(content, shown)).toEqual([]);
  expect(compareShown(content, shown.toReversed())).toEqual([]);
  fc.assert(
    fc.property(fc.nat({ max: 1 }), fc.nat({ max: 5 }), (row, field) => {
      const changed = structuredClone(shown);
      const target = changed[row];
      if (target === undefined) return;
      const nudge = (value: number) => (value === 0 ? Number.MIN_VALUE : value * (1 + Number.EPSILON));
      if (field === 0) target.infidelity = nudge(target.infidelity);
      else if (field === 1) target.dialledInfidelity = nudge(target.dialledInfidelity);
      else if (field < 4) target.dialsDeg[field - 2] = nudge(target.dialsDeg[field - 2] ?? 0);
      else target.fastAxesDeg[field - 4] = nudge(target.fastAxesDeg[field - 4] ?? 0);
      expect(compareShown(content, changed).length).toBeGreaterThan(0);
    }),
  );
});

test('the dials that a version asks for make the infidelity that it froze', () => {
  const { content } = frozen(input());
  for (const [index, target] of content.targets.entries()) {
    const solution = target.solutions[target.chosenSolution];
    expect(dialledInfidelity(content, index, solution?.dialsDeg ?? [])).toBe(solution?.dialledInfidelity);
  }
  expect(() => dialledInfidelity(content, 0, [1])).toThrow(RangeError);
  expect(() => dialledInfidelity(content, 9, [1, 2])).toThrow(RangeError);
});

test('dials chosen for the least travel make the infidelity that is frozen with them, whatever the step', () => {
  const expressions = ['H', 'bloch(70deg, 20deg)', 'D', 'bloch(110deg, 200deg)', 'A', 'V'];
  const { draft, bench } = input({}, expressions);
  const plates = bench.plates.map((one) => ({ ...one, mount: { ...one.mount, resolutionDeg: 0.7 } }));
  for (const presentDialsDeg of [null, [200, 100], [20, 300]]) {
    const { content } = frozen(
      input({
        bench: { ...bench, plates },
        draft: { ...draft, objective: 'least-travel', presentDialsDeg },
      }),
    );
    for (const [index, target] of content.targets.entries()) {
      const solution = target.solutions[target.chosenSolution];
      expect(dialledInfidelity(content, index, solution?.dialsDeg ?? [])).toBe(solution?.dialledInfidelity);
    }
  }
});

test('a list that cannot be planned by the least travel is refused at its row, never chosen some other way', () => {
  const { draft, bench } = input();
  const plates = bench.plates.map((one) => ({
    ...one,
    mount: { ...one.mount, rangeDeg: { from: 0, to: 180 }, backlashDeg: 120, approach: 'rising' as const },
  }));
  const narrow = { ...bench, plates };
  const refused = freeze(input({ bench: narrow, draft: { ...draft, objective: 'least-travel' } }));
  if (refused.ok) throw new Error('it was frozen');
  expect(refused.faults.map(({ path }) => path)).toEqual(['targets.0']);
  expect(refused.faults[0]?.message).toMatch(/^Row 1 \(t1\) .* the mount of (H-3|Q-B) does not reach it/);
  expect(freeze(input({ bench: narrow })).ok).toBe(true);
});

test('present dials of another number of plates are frozen as what they are to the solver: not known', () => {
  const { draft } = input();
  const held = (presentDialsDeg: number[] | null) =>
    frozen(input({ draft: { ...draft, objective: 'nearest-to-present', presentDialsDeg } })).content;
  expect(held([10, 20]).presentDialsDeg).toEqual([10, 20]);
  expect(held([10]).presentDialsDeg).toBeNull();
  expect(held([10, 20, 30]).presentDialsDeg).toBeNull();
  expect(held([10]).targets).toEqual(held(null).targets);
});

test('a chain is verified, and the first version that was touched is named', () => {
  const links: { number: number; canonicalJson: string; contentHash: string; parentHash: string | null }[] =
    [];
  for (let number = 1; number <= 4; number += 1) {
    const parentHash = links.at(-1)?.contentHash ?? null;
    const { canonicalJson: text, contentHash: hash } = frozen(input({ number, parentHash }));
    links.push({ number, canonicalJson: text, contentHash: hash, parentHash });
  }
  expect(verifyChain(links)).toEqual({ ok: true, length: 4 });
  expect(verifyChain([])).toEqual({ ok: true, length: 0 });
  const touched = (change: (copy: typeof links) => typeof links) =>
    verifyChain(change(structuredClone(links)));
  const third = (change: Partial<(typeof links)[number]>) => (copy: typeof links) =>
    copy.map((link) => (link.number === 3 ? { ...link, ...change } : link));
  expect(touched(third({ canonicalJson: '{}' }))).toMatchObject({ ok: false, number: 3 });
  expect(touched(third({ canonicalJson: '{}', contentHash: contentHash('{}') }))).toMatchObject({
    ok: false,
    number: 3,
  });
  expect(touched(third({ canonicalJson: 'no json', contentHash: contentHash('no json') }))).toMatchObject({
    ok: false,
    number: 3,
  });
  expect(touched(third({ parentHash: null }))).toMatchObject({ ok: false, number: 3 });
  expect(touched((copy) => copy.filter(({ number }) => number !== 2))).toMatchObject({
    ok: false,
    number: 3,
  });
  expect(touched((copy) => copy.toSorted((a, b) => b.number - a.number))).toMatchObject({
    ok: false,
    number: 4,
  });
});

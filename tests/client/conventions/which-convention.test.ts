import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  CONVENTION_SETS,
  letterOf,
  parseState,
  sameConvention,
  showStokes,
  translateJones,
  stokesToJones,
} from '../../../shared/optics';
import { eliminationSentences, judgedWords } from '../../../src/features/conventions/colleague-words';
import { EVERY_CONVENTION } from '../../../src/features/conventions/flag-words';
import {
  clashesOf,
  type Evidence,
  leavesRoomFor,
  whichConvention,
} from '../../../src/features/conventions/which-convention';

const nothingKnown: Evidence = { source: '', rotation: null, letter: null, s3: null };

function judged(evidence: Partial<Evidence>) {
  const found = whichConvention({ ...nothingKnown, ...evidence });
  if (found.kind !== 'judged') throw new Error(`expected a judgement, not "${found.kind}"`);
  return found;
}
const fitting = (evidence: Partial<Evidence>) =>
  judged(evidence)
    .sets.filter(({ fits }) => fits)
    .map(({ set }) => set.id);

/** What a person with a convention writes of one light, as evidence; the vector as a column of plain numbers. */
function evidenceBy(k: number, stokes: readonly [number, number, number]): Evidence {
  const convention = EVERY_CONVENTION[k];
  if (convention === undefined) throw new Error('no such convention');
  const { aRe, aIm, bRe, bIm } = translateJones(stokesToJones(stokes), convention);
  return {
    source: `[${aRe.toFixed(9)} + (${aIm.toFixed(9)}) i, ${bRe.toFixed(9)} + (${bIm.toFixed(9)}) i]`,
    rotation: stokes[2] > 0 ? 'counter-clockwise' : 'clockwise',
    letter: letterOf(stokes, convention),
    s3: showStokes(stokes, convention).s3 > 0 ? '+' : '−',
  };
}

describe('which convention a colleague can be using', () => {
  it('finds the one convention of three flags again from what it writes of any elliptical light', () => {
    fc.assert(
      fc.property(
        fc.nat({ max: EVERY_CONVENTION.length - 1 }),
        fc.double({ min: -1.5, max: 1.5, noNaN: true }),
        fc.double({ min: 0.05, max: 1.5, noNaN: true }),
        fc.boolean(),
        (k, azimuth, ellipticity, other) => {
          const chi = other ? -ellipticity : ellipticity;
          const stokes = [
            Math.cos(chi) * Math.cos(azimuth),
            Math.cos(chi) * Math.sin(azimuth),
            Math.sin(chi),
          ] as const;
          expect(judged(evidenceBy(k, stokes)).remaining).toEqual([EVERY_CONVENTION[k]]);
        },
      ),
    );
  });

  it('knows the phase from a vector and how its field turns: [1, i] turns counter-clockwise under kz − ωt', () => {
    // optics.md 1: (H + iV)/√2 in e^{i(kz − ωt)} has S3 = +1, counter-clockwise to the receiver.
    const { remaining, settled } = judged({ source: '[1, i]', rotation: 'counter-clockwise' });
    expect(settled).toEqual(['phase']);
    expect(remaining.every(({ phase }) => phase === 'kz-wt')).toBe(true);
    expect(judged({ source: '[1, -i]', rotation: 'counter-clockwise' }).remaining[0]?.phase).toBe('wt-kz');
  });

  it('knows who names the hands from a turn and its name, and the sign of S3 from a name and its sign', () => {
    // optics.md 2: counter-clockwise is L from the receiver, R from the source.
    expect(judged({ rotation: 'counter-clockwise', letter: 'R' }).remaining).toHaveLength(4);
    expect(
      judged({ rotation: 'counter-clockwise', letter: 'R' }).remaining.every(
        ({ handedness }) => handedness === 'source',
      ),
    ).toBe(true);
    expect(judged({ letter: 'L', s3: '−' }).remaining.every(({ s3Sign }) => s3Sign === 'R')).toBe(true);
  });

  it('rules a set out only by what its sources settle', () => {
    // IEEE Std 149-1979 settles the hands alone: a colleague with the other phase may still follow it.
    const ids = fitting({ source: '[1, i]', rotation: 'counter-clockwise', letter: 'R' });
    expect(ids).toContain('ieee-source');
    expect(ids).not.toContain('receiver-optics-kz');
    const ieee = judged({ source: '[1, i]', rotation: 'counter-clockwise', letter: 'R' }).sets.find(
      ({ set }) => set.id === 'ieee-source',
    );
    expect(ieee?.otherwise).toEqual(['phase']);
  });

  it('holds the 2001 qubit paper to its letters: (H + iV)/√2 is L there, whatever the phase and whoever names', () => {
    // James, Kwiat, Munro, White, Phys. Rev. A 64, 052312 (2001): R = (H − iV)/√2, L = (H + iV)/√2.
    expect(fitting({ source: '[1, i]', letter: 'L' })).toContain('qubit-measurement-2001');
    expect(fitting({ source: '[1, i]', letter: 'R' })).not.toContain('qubit-measurement-2001');
  });

  it('is right about the 2001 paper being the only set whose sources settle neither phase nor hands', () => {
    const both = CONVENTION_SETS.filter(({ notFixedBySource: open }) =>
      ['phase' as const, 'handedness' as const].every((flag) => open.includes(flag)),
    );
    expect(both.map(({ id }) => id)).toEqual(['qubit-measurement-2001']);
  });

  it('lets every set fit what it writes itself, and says of one that does not fit why', () => {
    for (const set of CONVENTION_SETS) {
      expect(leavesRoomFor(set, set.convention)).toBe(true);
      const k = EVERY_CONVENTION.findIndex((convention) => sameConvention(convention, set.convention));
      const evidence = evidenceBy(k, [0.6, 0, 0.8]);
      expect(fitting(evidence)).toContain(set.id);
      for (const other of judged(evidence).sets) {
        if (other.fits) continue;
        expect(other.clashes.length).toBeGreaterThan(0);
        expect(clashesOf(evidence, other.asConvention)).toEqual(other.clashes);
        expect(judgedWords(other, evidence)).toMatch(/^(?:reads|calls|writes)/u);
      }
    }
  });

  it('reads a letter in the vector’s field as each convention would', () => {
    // Someone who writes L for light that turns clockwise names hands from the source.
    expect(parseState('L', { phase: 'kz-wt', handedness: 'source', s3Sign: 'R' })).toMatchObject({
      ok: true,
    });
    const { remaining } = judged({ source: 'L', rotation: 'clockwise' });
    expect(remaining.every(({ handedness }) => handedness === 'source')).toBe(true);
    expect(remaining).toHaveLength(4);
  });

  it('says of answers that contradict each other that no convention fits', () => {
    const found = judged({ source: 'L', letter: 'R' });
    expect(found.remaining).toEqual([]);
    expect(eliminationSentences(found)[0]).toMatch(/^No convention fits all of this at once/u);
    expect(found.sets.some(({ fits }) => fits)).toBe(false);
  });

  it('asks for each fact once, however many flags it would settle', () => {
    const asked = eliminationSentences(judged({ source: '[1, i]', rotation: 'counter-clockwise' })).at(-1);
    expect(asked).toMatch(
      /Ask of one light that turns: which way it turns for the receiver, what they call it and the sign of its S3\.$/u,
    );
  });

  it('concludes nothing from one fact, from linear light, or from what cannot be read', () => {
    expect(whichConvention({ ...nothingKnown, letter: 'L' }).kind).toBe('nothing');
    expect(whichConvention({ ...nothingKnown, source: '[1, i]' }).kind).toBe('nothing');
    expect(whichConvention({ ...nothingKnown, source: '[1, 1]', rotation: 'clockwise' }).kind).toBe('linear');
    expect(whichConvention({ ...nothingKnown, source: '[1, ', rotation: 'clockwise' })).toMatchObject({
      kind: 'unreadable',
    });
  });

  it('says what is certain by now and what to ask next', () => {
    const sentences = eliminationSentences(judged({ rotation: 'clockwise', letter: 'L' })).join(' ');
    expect(sentences).toContain('Certain by now: hands named from the source.');
    expect(sentences).toContain('Still open: phase and sign of S3.');
  });
});

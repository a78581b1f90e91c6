import { describe, expect, it } from 'vitest';
import { CONVENTION_SETS, DEFAULT_CONVENTION, parseState } from '../../../shared/optics';
import { addressSearch, readAddress } from '../../../src/features/conventions/address';
import { compareWritten } from '../../../src/features/conventions/compare-written';
import {
  type Chosen,
  type ComparedRow,
  differingNames,
} from '../../../src/features/conventions/compared-rows';
import { comparisonSentence } from '../../../src/features/conventions/comparison-sentence';
import { comparisonText } from '../../../src/features/conventions/comparison-text';
import { fieldMoments } from '../../../src/features/conventions/field-times';
import { EVERY_CONVENTION, knowledgeOf } from '../../../src/features/conventions/flag-words';
import { anchorSentence, asPlate } from '../../../src/features/conventions/light-words';
import { degreeSentence } from '../../../src/features/conventions/LightFigure';
import { plateSentence } from '../../../src/features/conventions/UnitaryFigure';

const canonical: Chosen = { convention: DEFAULT_CONVENTION, setId: null };
const ownLab = { name: 'Tern Street', convention: DEFAULT_CONVENTION };

function compared(kind: 'state' | 'unitary', source: string, chosen = canonical, own = ownLab) {
  const written = compareWritten(kind, source, chosen, own);
  if (written.kind === 'empty' || written.kind === 'unreadable') throw new Error(written.kind);
  return written;
}
const shown = (row: ComparedRow | undefined, id: string) =>
  row?.parts.find((part) => part.id === id)?.values.map((value) => value.shown);
const rowOf = (rows: readonly ComparedRow[], id: string) => rows.find((row) => row.id === id);

describe('one state in every convention', () => {
  it('keeps the light and turns only what each flag turns', () => {
    // optics.md 2: ωt − kz conjugates the vector; the source names counter-clockwise R; the sign is of the shown S3 only.
    const { rows } = compared('state', '(H + i V)/sqrt(2)');
    expect(shown(rowOf(rows, 'own'), 'jones')).toEqual(['0.707', '0.707i']);
    expect(shown(rowOf(rows, 'own'), 'hand')).toEqual(['left (L)']);
    expect(shown(rowOf(rows, 'own'), 'stokes')).toEqual(['0.000', '0.000', '1.000']);
    expect(shown(rowOf(rows, 'receiver-optics-kz'), 'jones')).toEqual(['0.707', '0.707i']);
    expect(shown(rowOf(rows, 'receiver-optics-kz'), 'stokes')).toEqual(['0.000', '0.000', '−1.000']);
    expect(shown(rowOf(rows, 'receiver-optics-kz'), 'ellipse')).toEqual(['0.0°', '−45.0°']);
    expect(shown(rowOf(rows, 'ieee-source'), 'jones')).toEqual(['0.707', '−0.707i']);
    expect(shown(rowOf(rows, 'ieee-source'), 'hand')).toEqual(['right (R)']);
    expect(shown(rowOf(rows, 'ieee-source'), 'bloch')).toEqual(['0.000', '−1.000', '0.000']);
  });

  it('reads it in the convention that it is typed in', () => {
    const iau = CONVENTION_SETS.find(({ id }) => id === 'iau-1974');
    if (iau === undefined) throw new Error('no such set');
    const { rows } = compared('state', 'R', { convention: iau.convention, setId: iau.id });
    // Its R turns counter-clockwise for the receiver, who calls that L.
    expect(shown(rowOf(rows, 'own'), 'hand')).toEqual(['left (L)']);
    expect(rowOf(rows, 'iau-1974')?.typed).toBe(true);
    expect(differingNames(rows[0] ?? rowsMissing())).toEqual(['Jones vector', 'hand', 'Bloch y']);
  });

  it('puts one’s own first, what was typed next if that is neither, and a stranger’s typed one first', () => {
    const bare = { convention: { ...DEFAULT_CONVENTION, handedness: 'source' } as const, setId: null };
    const ids = (own: typeof ownLab | null, chosen: Chosen) => {
      const written = compareWritten('state', 'D', chosen, own);
      return written.kind === 'state' ? written.rows.slice(0, 2).map(({ id }) => id) : [];
    };
    expect(ids(ownLab, canonical)).toEqual(['own', CONVENTION_SETS[0]?.id]);
    expect(ids(ownLab, bare)).toEqual(['own', 'typed']);
    expect(ids(null, bare)).toEqual(['typed', CONVENTION_SETS[0]?.id]);
  });

  it('keeps the degree of partly polarised light, and has no vector for unpolarised light', () => {
    const partly = compared('state', 'stokes(0.3, 0, 0.4)');
    if (partly.kind !== 'state') throw new Error('not a state');
    expect(shown(partly.rows[0], 'stokes')).toEqual(['0.300', '0.000', '0.400']);
    // Of length √(0.3² + 0.4²).
    expect(degreeSentence(partly.stokes)).toMatch(/^Its degree of polarisation is 0\.500;/u);
    const none = compared('state', 'stokes(0, 0, 0)');
    if (none.kind !== 'state') throw new Error('not a state');
    expect(shown(none.rows[0], 'jones')).toEqual(['—', '—']);
    expect(anchorSentence(none.stokes)).toMatch(/unpolarised/u);
  });

  it('says no angle or field that a convention could turn: the field is the light’s own', () => {
    const readings = EVERY_CONVENTION.map((convention) =>
      // The same light: what each convention writes for counter-clockwise circular light.
      parseState(convention.phase === 'kz-wt' ? '[1, i]' : '[1, -i]', convention),
    );
    for (const reading of readings) {
      if (!reading.ok) throw new Error('unreadable');
      expect(anchorSentence(reading.stokes)).toBe('The field turns counter-clockwise for the receiver.');
      // A quarter period after it points along H it points along V.
      expect(fieldMoments(reading.stokes).map(({ towardsDeg }) => Math.round(towardsDeg ?? 999))).toEqual([
        0, 45, 90, 135, 180, -135, -90, -45,
      ]);
    }
  });
});

function rowsMissing(): never {
  throw new Error('no row');
}

describe('one unitary in every convention', () => {
  it('conjugates the matrix under ωt − kz and turns row and column of S3 with its sign', () => {
    const { rows } = compared('unitary', 'qwp(0deg)');
    // diag(e^{−iπ/4}, e^{+iπ/4}), its slow component behind.
    expect(shown(rowOf(rows, 'own'), 'matrix')).toEqual(['0.707−0.707i', '0.000', '0.000', '0.707+0.707i']);
    expect(shown(rowOf(rows, 'ieee-source'), 'matrix')?.[0]).toBe('0.707+0.707i');
    const signs = (id: string) => shown(rowOf(rows, id), 'mueller')?.filter((_, k) => k === 11 || k === 14);
    const own = signs('own');
    expect(own).toHaveLength(2);
    // +S3 is R, named by the receiver: the other sign than one's own.
    expect(signs('receiver-optics-kz')).toEqual([own?.[1], own?.[0]]);
    expect(signs('ieee-source')).toEqual(own);
  });

  it('is the same plate for everyone: what passes first, and by how much the opposite falls behind', () => {
    for (const convention of EVERY_CONVENTION) {
      const written = compareWritten('unitary', 'qwp(30deg)', { convention, setId: null }, null);
      if (written.kind !== 'unitary') throw new Error('unreadable');
      expect(plateSentence(written.unitary)).toBe(
        'It passes a line at 30.0° first; the light opposite to that falls behind by 90.0°.',
      );
    }
    const nothing = compared('unitary', 'hwp(10deg) hwp(10deg)');
    if (nothing.kind !== 'unitary') throw new Error('unreadable');
    expect(asPlate(nothing.unitary)).toBeNull();
  });
});

describe('the sentence above the table', () => {
  it('counts what stands below it', () => {
    const { rows } = compared('state', 'ellipse(30deg, 20deg)');
    const sets = rows.filter(({ set }) => set !== null);
    const same = sets.filter((row) => differingNames(row).length === 0).length;
    const left = sets.filter((row) => shown(row, 'hand')?.[0] === 'left (L)').length;
    // Of the sets, by hand: one has all three flags; five name from the receiver, three from the source.
    expect([same, left, sets.length]).toEqual([1, 5, 8]);
    expect(comparisonSentence({ kind: 'state', rows, writer: 'you' })).toBe(
      'One of the eight writes this light as you do; five call it left, three right.',
    );
  });

  it('says of linear light that there is nothing to disagree about', () => {
    const { rows } = compared('state', 'linear(30deg)');
    expect(comparisonSentence({ kind: 'state', rows, writer: 'you' })).toBe(
      'All eight write this light as you do: without a hand there is nothing to disagree about.',
    );
  });

  it('says how one’s own lab writes what was typed in another convention', () => {
    const ieee = CONVENTION_SETS.find(({ id }) => id === 'ieee-source');
    if (ieee === undefined) throw new Error('no such set');
    const { rows } = compared('state', 'R', { convention: ieee.convention, setId: ieee.id });
    expect(comparisonSentence({ kind: 'state', rows, writer: 'typed' })).toMatch(
      /as it is typed; .*Your lab writes it otherwise: Jones vector, hand and Bloch y differ\.$/u,
    );
  });
});

describe('what is known of a set’s flags', () => {
  it('calls a flag filled in where no source settles it, and read where one was read', () => {
    const ieee = CONVENTION_SETS.find(({ id }) => id === 'ieee-source');
    const jackson = CONVENTION_SETS.find(({ id }) => id === 'positive-helicity');
    if (ieee === undefined || jackson === undefined) throw new Error('no such set');
    expect(knowledgeOf(ieee, 'handedness')).toBe('read');
    expect(knowledgeOf(ieee, 'phase')).toBe('filled in');
    expect(knowledgeOf(jackson, 's3Sign')).toBe('from memory');
  });
});

describe('the comparison as text', () => {
  it('names each convention with its flags, in ASCII numbers, and says what all agree on', () => {
    const source = '(H + i V)/sqrt(2)';
    const { rows } = compared('state', source);
    const text = comparisonText({
      kind: 'state',
      source,
      writtenIn: 'Tern Street',
      facts: ['A fact.'],
      rows,
    });
    const lines = text.trimEnd().split('\n');
    expect(lines.slice(0, 3)).toEqual([
      '# One state in every convention: (H + i V)/sqrt(2)',
      '# typed in: Tern Street',
      '# A fact.',
    ]);
    expect(lines).toHaveLength(4 + 1 + CONVENTION_SETS.length);
    for (const { name } of CONVENTION_SETS) expect(text).toContain(name);
    expect(text).toContain('"IEEE, source view",ωt − kz,source,R,0.707107,-0.707107i,right (R)');
    expect(text.split('\n')[3]?.split(',')).toHaveLength(4 + 2 + 1 + 3 + 2 + 3);
  });
});

describe('the address', () => {
  it('says the same to whoever opens it, for every convention and set', () => {
    const choices = [
      ...EVERY_CONVENTION.map((convention) => ({ convention, setId: null })),
      ...CONVENTION_SETS.map(({ id, convention }) => ({ convention, setId: id })),
    ];
    for (const chosen of choices) {
      const search = new URLSearchParams(addressSearch('state', 'H + i V & "x"', chosen).toString());
      expect(readAddress(search)).toEqual({ kind: 'state', source: 'H + i V & "x"', chosen, unknown: null });
    }
    expect(readAddress(new URLSearchParams('unitary=X&in=old-set'))).toEqual({
      kind: 'unitary',
      source: 'X',
      chosen: null,
      unknown: 'old-set',
    });
  });
});

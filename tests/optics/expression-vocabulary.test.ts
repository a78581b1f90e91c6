import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION, parseState, parseUnitary } from '../../shared/optics';
import { completionsAt, VOCABULARY } from '../../shared/optics/expression/vocabulary';

test.each(VOCABULARY.map((entry) => [entry.name, entry] as const))(
  '%s: its example reads as what it is said to be',
  (_, { kind, example, insert, help, signature }) => {
    const state = parseState(example, DEFAULT_CONVENTION);
    const unitary = parseUnitary(example, DEFAULT_CONVENTION);
    expect({ state: state.ok, unitary: unitary.ok }).toEqual({
      state: kind !== 'unitary' && kind !== 'word',
      unitary: kind === 'unitary' || kind === 'word',
    });
    if (kind === 'state' || kind === 'unitary') expect(example).toContain(insert.charAt(0));
    expect(help).toMatch(/^.{8,90}\.$/u);
    expect(signature.length).toBeGreaterThan(0);
  },
);

test('no two entries complete to the same text', () => {
  const inserts = VOCABULARY.map(({ insert }) => insert);
  expect(new Set(inserts).size).toBe(inserts.length);
});

/** What is offered where "▮" stands, and the text that it replaces. */
function offered(marked: string, mode: 'state' | 'unitary'): { replaces: string; inserts: string[] } {
  const source = marked.replace('▮', '');
  const { from, to, entries } = completionsAt(source, marked.indexOf('▮') + 1, mode);
  return { replaces: source.slice(from, to), inserts: entries.map(({ insert }) => insert) };
}

test('the word at the cursor is completed, and nothing before it', () => {
  expect(offered('ha▮', 'unitary')).toEqual({ replaces: 'ha', inserts: ['hadamard'] });
  expect(offered('2i had▮ H', 'state')).toEqual({ replaces: 'had', inserts: ['hadamard'] });
  expect(offered('2ihad▮', 'state')).toEqual({ replaces: 'had', inserts: ['hadamard'] });
  expect(offered('rotate(sq▮, 3deg)', 'unitary').inserts).toEqual(['sqrtX', 'sqrtY', 'sqrtZ', 'sqrt(']);
  expect(offered('H + |+▮ V', 'state')).toEqual({ replaces: '|+', inserts: ['|+>', '|+i>'] });
  expect(offered('qwp(45d▮)', 'unitary')).toEqual({ replaces: 'd', inserts: ['dagger(', 'deg'] });
  expect(offered('Had▮', 'unitary').inserts).toEqual(['hadamard']);
  expect(offered('from H t▮', 'unitary').inserts).toEqual(['to ']);
  expect(offered('quux▮', 'state').inserts).toEqual([]);
  expect(offered('H + V▮ + D', 'state')).toEqual({ replaces: 'V', inserts: ['V'] });
});

test('with nothing to complete all is offered, what is wanted first', () => {
  expect(offered('▮', 'state').inserts[0]).toBe('H');
  expect(offered('X ▮', 'unitary').inserts[0]).toBe('identity');
  expect(offered('X ▮', 'unitary').inserts).toHaveLength(VOCABULARY.length);
});

test('a cursor anywhere, and outside, is answered within the source', () => {
  const source = '  (H + i bloch(3deg, 4deg))|+i> ha';
  for (let column = -3; column < source.length + 5; column += 1) {
    const { from, to } = completionsAt(source, column, 'state');
    expect(from).toBeGreaterThanOrEqual(0);
    expect(to).toBeGreaterThanOrEqual(from);
    expect(to).toBeLessThanOrEqual(source.length);
  }
});

import { expect, test } from 'vitest';
import { canonicalJson, sortedJson } from '../../shared/protocol/canonical-json';

test('keys are sorted by UTF-16 code units, numbers and strings written the shortest way (RFC 8785, sections 3.2.2 and 3.2.3)', () => {
  expect(canonicalJson({ b: [1e21, 4.5, 2e-3, -0], a: { '€': '\u000f\n', '\r': null, 1: true } })).toBe(
    '{"a":{"\\r":null,"1":true,"€":"\\u000f\\n"},"b":[1e+21,4.5,0.002,0]}',
  );
});

test('half of a surrogate pair is refused wherever it stands, and a whole pair is kept as it is', () => {
  const half = '\ud83d';
  for (const value of [
    half,
    [half],
    { a: { b: [`x${half}`] } },
    { [half]: 1 },
    { a: [{ [`${half}x`]: 1 }] },
  ]) {
    expect(() => canonicalJson(value)).toThrow(/half of a surrogate pair/);
  }
  expect(canonicalJson({ '😀': '\ud83d\ude00' })).toBe('{"😀":"😀"}');
});

test('values that hold half of a pair can still be told apart', () => {
  expect(sortedJson({ b: '\ud83d', a: 1 })).toBe('{"a":1,"b":"\\ud83d"}');
  expect(sortedJson('\ud83d')).not.toBe(sortedJson('\ud83e'));
});

test('what JSON cannot hold is refused', () => {
  expect(() => canonicalJson(undefined)).toThrow(TypeError);
  expect(() => canonicalJson({ a: Number.NaN })).toThrow();
});

import { describe, expect, it } from 'vitest';
import { safeReturnTo, signInProblem } from '../../../src/features/session/sign-in-problem';

describe('a sign-in that did not work', () => {
  it('is told in a sentence with a way on, for every code of the server', () => {
    for (const code of ['declined', 'stale', 'provider', 'too-many', 'disabled', 'failed']) {
      expect(signInProblem(code)).toMatch(/\. .+\.$/);
    }
    expect(signInProblem(null)).toBeNull();
  });

  it('never repeats what stands in the address', () => {
    expect(signInProblem('<b>call this number</b>')).toBe(signInProblem('failed'));
  });
});

describe('where a sign-in goes on to', () => {
  it.each(['//elsewhere.test', '/\\elsewhere.test', 'https://elsewhere.test', '', null])(
    'is home for %s',
    (value) => {
      expect(safeReturnTo(value)).toBe('/');
    },
  );

  it('is a path of ours', () => {
    expect(safeReturnTo('/labs/1/cabinet?do=add')).toBe('/labs/1/cabinet?do=add');
  });
});

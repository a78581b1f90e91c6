import { describe, expect, it } from 'vitest';
import { HOME_VIEW, project, viewFrame } from '../../../src/sphere/view';
import { applyCommand, commandForKey } from '../../../src/sphere/view-keys';
import { linearPoint } from '../../../src/sphere/vec';
import { CONVENTION } from './support';

const key = (name: string, shiftKey = false) =>
  commandForKey({ key: name, shiftKey, ctrlKey: false, metaKey: false, altKey: false });

function after(...keys: readonly (readonly [string, boolean?])[]) {
  return keys.reduce((view, [name, shift]) => {
    const command = key(name, shift ?? false);
    return command === undefined ? view : applyCommand(view, command, CONVENTION);
  }, HOME_VIEW);
}

describe('the keys of the sphere', () => {
  it('turn by 5°, with Shift by 1°, and back again', () => {
    expect(after(['ArrowLeft']).longitudeDeg).toBe(HOME_VIEW.longitudeDeg + 5);
    expect(after(['ArrowRight', true]).longitudeDeg).toBe(HOME_VIEW.longitudeDeg - 1);
    expect(after(['ArrowDown']).latitudeDeg).toBe(HOME_VIEW.latitudeDeg + 5);
    expect(after(['ArrowLeft'], ['ArrowRight'], ['ArrowUp'], ['ArrowDown'])).toEqual(HOME_VIEW);
  });

  it('move what is in front the way the arrow points', () => {
    const before = project(linearPoint(-30), viewFrame(HOME_VIEW));
    expect(project(linearPoint(-30), viewFrame(after(['ArrowRight']))).x).toBeGreaterThan(before.x);
    expect(project(linearPoint(-30), viewFrame(after(['ArrowUp']))).y).toBeLessThan(before.y);
  });

  it('stop at the poles and go round the equator', () => {
    expect(after(...Array.from({ length: 40 }, () => ['ArrowDown'] as const)).latitudeDeg).toBe(90);
    const round = after(...Array.from({ length: 72 }, () => ['ArrowLeft'] as const));
    expect(round.longitudeDeg).toBe(HOME_VIEW.longitudeDeg);
  });

  it('face a basis, and its other state when pressed again', () => {
    const middle = (...keys: readonly (readonly [string])[]) => viewFrame(after(...keys)).toViewer;
    expect(middle(['h'])[0]).toBeCloseTo(1, 12);
    expect(middle(['h'], ['h'])[0]).toBeCloseTo(-1, 12);
    expect(middle(['d'])[1]).toBeCloseTo(1, 12);
    expect(middle(['d'], ['d'])[1]).toBeCloseTo(-1, 12);
    // R is clockwise light for a lab that names hands from the receiver: the south of the drawing.
    expect(middle(['r'])[2]).toBeCloseTo(-1, 12);
    expect(middle(['r'], ['r'])[2]).toBeCloseTo(1, 12);
  });

  it('magnify within limits and go home', () => {
    expect(after(['+']).zoom).toBeGreaterThan(1);
    expect(after(...Array.from({ length: 30 }, () => ['+'] as const)).zoom).toBe(4);
    expect(after(['-']).zoom).toBe(1);
    expect(after(['h'], ['+'], ['0'])).toEqual(HOME_VIEW);
  });

  it('leave the browser’s own keys and the rest alone', () => {
    expect(
      commandForKey({ key: 'd', shiftKey: false, ctrlKey: true, metaKey: false, altKey: false }),
    ).toBeUndefined();
    expect(key('x')).toBeUndefined();
    expect(key('Tab')).toBeUndefined();
  });
});

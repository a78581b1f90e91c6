import { describe, expect, it } from 'vitest';
import { invitationToken } from '../../../src/features/welcome/invitation-token';

const token = 'q3Yb-0c_Zr8v1mN5kT7xW2sD4fG6hJ9lP0oI8uY6tR4';

describe('an invitation that was pasted', () => {
  it.each([`https://quarterturn.example/invitations/${token}`, ` /invitations/${token}/ `, token])(
    'is found in %s',
    (text) => expect(invitationToken(text)).toBe(token),
  );

  it.each(['', 'short', 'https://quarterturn.example/labs/1', 'two words of some length'])(
    'is not found in "%s"',
    (text) => expect(invitationToken(text)).toBeNull(),
  );
});

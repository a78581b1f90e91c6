import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Component as SignInPage } from '../../../src/features/session/SignInPage';
import { createQueryClient } from '../../../src/lib/query-client';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(path: string): void {
  vi.stubGlobal('fetch', () =>
    Promise.resolve(
      new Response(JSON.stringify({ user: null }), { headers: { 'content-type': 'application/json' } }),
    ),
  );
  const router = createMemoryRouter([{ path: '/sign-in', element: <SignInPage /> }], {
    initialEntries: [path],
  });
  render(
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
}

describe('the sign-in page', () => {
  it('says to who follows an invitation that one waits, and that signing in accepts nothing', () => {
    open('/sign-in?returnTo=%2Finvitations%2Fabc');
    expect(screen.getByText(/^You have an invitation to a lab\./u).textContent).toContain(
      'nothing is accepted',
    );
    expect(screen.getByRole('link', { name: 'Sign in with GitHub' }).getAttribute('href')).toContain(
      encodeURIComponent('/invitations/abc'),
    );
  });

  it('speaks of no invitation to anybody else', () => {
    open('/sign-in?returnTo=%2Flabs%2F1');
    expect(screen.getByRole('link', { name: 'Sign in with GitHub' })).toBeTruthy();
    expect(screen.queryByText(/^You have an invitation/u)).toBeNull();
  });
});

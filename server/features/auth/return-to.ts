const ownPath = /^\/(?![/\\])[\w\-./~%?=&]*$/;

/** Where to go after signing in: a path of ours, else home. Whatever a browser might read as another host is home. */
export function returnTo(value: unknown): string {
  if (typeof value !== 'string' || value.length > 500 || !ownPath.test(value)) return '/';
  const base = 'http://own.invalid';
  const url = URL.parse(value, base);
  if (url?.origin !== base) return '/';
  // Back into the sign-in itself would loop, and an address of the API is no page.
  if (/^\/(?:auth|api|sign-in)(?:\/|$)/.test(url.pathname)) return '/';
  const path = url.pathname + url.search;
  return ownPath.test(path) ? path : '/';
}

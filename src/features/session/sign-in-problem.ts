/** What went wrong at a sign-in, by the code that the server puts into the address. Never the provider's own words. */
const sentences: ReadonlyMap<string, string> = new Map([
  [
    'declined',
    'GitHub says that you did not agree, so nobody was signed in. Sign in again if that was a slip.',
  ],
  [
    'stale',
    'That sign-in was begun too long ago, or in another window, so nobody was signed in. Begin it again here.',
  ],
  [
    'provider',
    'GitHub did not answer as it should, so nobody was signed in. Try again in a minute; nothing is lost.',
  ],
  ['too-many', 'Too many sign-ins were begun from here in a short time. Wait a minute, then try again.'],
  ['disabled', 'This account is closed here. Ask a lead of your lab to have it opened.'],
  ['failed', 'The sign-in did not come to its end, so nobody was signed in. Try again.'],
]);

/** One sentence for a code in the address; null without one. An unknown code is a sign-in that failed. */
export function signInProblem(code: string | null): string | null {
  if (code === null) return null;
  return sentences.get(code) ?? sentences.get('failed') ?? null;
}

/** A path of ours to go on to; anything that a browser might read as another host is home. The server checks it again. */
export function safeReturnTo(value: string | null): string {
  return value !== null && /^\/(?![/\\])/.test(value) ? value : '/';
}

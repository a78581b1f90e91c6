import { useQuery } from '@tanstack/react-query';
import { Navigate, useSearchParams } from 'react-router-dom';
import { TextLink } from '../../components/TextLink';
import { SignInDrawing } from '../../sign-in-drawing/SignInDrawing';
import { sessionQuery, signInHref } from './queries';
import { safeReturnTo, signInProblem } from './sign-in-problem';

/** The one page for who is not signed in: a true drawing, two lines, one button. */
export function Component() {
  const [search] = useSearchParams();
  const returnTo = safeReturnTo(search.get('returnTo'));
  const problem = signInProblem(search.get('problem'));
  const { data: session } = useQuery(sessionQuery);
  if (session !== undefined && session.user !== null) return <Navigate to={returnTo} replace />;
  return (
    <main id="page" className="relative flex min-h-dvh flex-col overflow-x-clip">
      <title>Quarterturn</title>
      <SignInDrawing />
      <div className="relative px-5 pt-12 sm:px-10 lg:ml-[61.5vw] lg:px-0 lg:pt-[19.4dvh] lg:pr-10">
        <h1 className="text-[2.75rem] leading-none font-[720] tracking-[-0.02em] sm:text-[3.75rem]">
          Quarterturn
        </h1>
        <p className="mt-8 text-[1.3125rem] leading-[1.9375rem]">
          From a state on paper to the angles of your own plates.
          <br />A week later, whether the table still makes it.
        </p>
        {problem !== null && (
          <p role="alert" className="text-fault font-strong mt-6 max-w-md">
            {problem}
          </p>
        )}
        <a
          href={signInHref(returnTo)}
          className="border-ink bg-ink text-paper hover:bg-ink-2 mt-9 inline-flex min-h-[3.375rem] items-center rounded border px-7 text-[1.1875rem] font-strong"
        >
          Sign in with GitHub
        </a>
        <p className="text-s text-ink-2 mt-4 max-w-[25rem]">
          Quarterturn reads your GitHub name and e-mail address and nothing else. A lab opens to you when its
          lead has invited you.
        </p>
        <p className="mt-8">
          <TextLink to="/quick-angles">Angles for one state, without signing in</TextLink>
        </p>
      </div>
      <footer className="text-s relative mt-auto flex gap-7 px-5 pt-16 pb-9 sm:px-10 lg:ml-[61.5vw] lg:px-0">
        <TextLink to="/how-numbers-are-made">How the numbers are made</TextLink>
        <TextLink to="/privacy">Privacy</TextLink>
      </footer>
    </main>
  );
}

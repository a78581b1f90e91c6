import { useQuery } from '@tanstack/react-query';
import { Navigate, useSearchParams } from 'react-router-dom';
import { TextLink } from '../../components/TextLink';
import { SignInDrawing } from '../../sign-in-drawing/SignInDrawing';
import { sessionQuery, signInHref } from './queries';
import { safeReturnTo, signInProblem } from './sign-in-problem';
import './sign-in-page.css';

/** The one page for who is not signed in: a true drawing, two lines, one button. */
export function Component() {
  const [search] = useSearchParams();
  const returnTo = safeReturnTo(search.get('returnTo'));
  const problem = signInProblem(search.get('problem'));
  const { data: session } = useQuery(sessionQuery);
  if (session !== undefined && session.user !== null) return <Navigate to={returnTo} replace />;
  return (
    <main id="page" className="sign-in-page">
      <title>Quarterturn</title>
      <div className="sign-in-words">
        <h1 className="sign-in-name">Quarterturn</h1>
        <p className="sign-in-lines">
          From a state on paper to the angles of your own plates.
          <br />A week later, whether the table still makes it.
        </p>
        {problem !== null && (
          <p role="alert" className="text-fault font-strong mt-5 max-w-md">
            {problem}
          </p>
        )}
        {returnTo.startsWith('/invitations/') && (
          <p className="font-strong mt-5 max-w-md">
            You have an invitation to a lab. Sign in, and it says which lab and what you would be there;
            nothing is accepted by signing in.
          </p>
        )}
        <a href={signInHref(returnTo)} className="sign-in-button">
          Sign in with GitHub
        </a>
        <p className="text-s text-ink-2 mt-4 max-w-[25.5rem]">
          Quarterturn reads your GitHub name, login, account number and e-mail address, and nothing else. Make
          a lab of your own, or accept a lead’s invitation.
        </p>
        <p className="mt-7 text-[1rem]">
          <TextLink to="/quick-angles">Angles for one state, without signing in</TextLink>
        </p>
      </div>
      <SignInDrawing />
      <footer className="sign-in-foot text-s">
        <TextLink to="/how-numbers-are-made">How the numbers are made</TextLink>
        <TextLink to="/privacy">Privacy</TextLink>
      </footer>
    </main>
  );
}

import { useEffect } from 'react';
import { useRouteError } from 'react-router-dom';
import { ApiError } from '../lib/api';
import { BeamWrong } from '../components/BeamState';
import { TextLink } from '../components/TextLink';

interface Words {
  readonly title: string;
  readonly text: string;
  /** Whether the same address may answer otherwise the next time. */
  readonly mayChange: boolean;
}

function inWords(error: unknown): Words {
  if (error instanceof ApiError) {
    if (error.status === 404) {
      return {
        title: 'There is no such page',
        text: 'Either it never was, or it is not yours to see.',
        mayChange: false,
      };
    }
    if (error.status === 403)
      return { title: 'This is not yours to do', text: error.message, mayChange: false };
    if (error.status === 401)
      return { title: 'You are signed out', text: 'Sign in again to go on.', mayChange: true };
    return { title: 'This page could not be fetched', text: error.message, mayChange: true };
  }
  // A script of an older build that the server no longer has.
  if (error instanceof TypeError && /dynamically imported|module script/iu.test(error.message)) {
    return {
      title: 'Quarterturn was renewed',
      text: 'Load the page again to go on with the new one.',
      mayChange: true,
    };
  }
  return {
    title: 'This page broke',
    text: 'What you typed into a draft is kept on this device. Load the page again to go on.',
    mayChange: true,
  };
}

/** What stands in a page's place when it can't be shown: what, why, and one way on. */
export function RouteFault() {
  const error = useRouteError();
  const { title, text, mayChange } = inWords(error);
  useEffect(() => {
    document.title = `${title} – Quarterturn`;
  }, [title]);
  return (
    <main className="px-5 pt-12 sm:px-10">
      <BeamWrong title={title}>
        {text}
        <span className="mt-4 flex gap-6">
          <TextLink to="/">Go home</TextLink>
          {mayChange && (
            <a className="beam-link" href={window.location.href}>
              Load it again
            </a>
          )}
        </span>
      </BeamWrong>
    </main>
  );
}

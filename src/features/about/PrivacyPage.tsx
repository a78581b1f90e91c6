import { Passage } from './Passage';

/** Public: what the product keeps of a person. Every sentence here has to be true of the server. */
export function Component() {
  return (
    <article className="max-w-[44rem] pb-16">
      <title>Privacy · Quarterturn</title>
      <h1 className="text-title mt-8 mb-6">Privacy</h1>

      <Passage title="What is read when you sign in">
        <p>
          GitHub tells Quarterturn your account’s number, your login name, the name you show there and an
          e-mail address. It is asked for nothing else, and Quarterturn never learns your password. GitHub’s
          access token is used for those questions and then dropped.
        </p>
      </Passage>

      <Passage title="What is kept">
        <p>
          Your name, login name, account number and address; which labs you belong to and as what; and what
          you made in them: plates, calibrations, protocols, versions, runs. Versions, calibrations and
          readings name the person who made them and are not changed afterwards, since a lab has to be able to
          say which angles a data set was taken with.
        </p>
        <p>
          Each sign-in and sign-out, each sign-in that failed and each request that was refused for want of a
          right is written down with its time, its kind, a request number and, where it is known, the account.
          This is kept for good, so that a lab can find out who came in. Each change is also written to a log
          of the lab, which is kept for good as well. The server’s own log holds the time, the address asked
          for and a request number; it holds no password, token or cookie.
        </p>
      </Passage>

      <Passage title="Who sees it">
        <p>
          The members of a lab see what is in that lab, and nobody else does. A person of another lab gets the
          same answer as for something that does not exist.
        </p>
      </Passage>

      <Passage title="Cookies">
        <p>
          One cookie, from this server, keeps you signed in. There is no counting of visitors, and no page
          asks another server for anything: fonts and scripts come from here.
        </p>
      </Passage>

      <Passage title="What stays in this browser">
        <p>
          How pages look on this device, and whether single-letter keys are on. What you typed in a draft
          until the server has saved it, and at the bench where you are in a run, what you confirmed and the
          readings that have not arrived, until that run is finished and opened again here. These are kept
          under your account, stay when you sign out, and go when you clear this site’s data in the browser.
        </p>
      </Passage>

      <Passage title="Quick angles">
        <p>
          What you write on the quick-angles page is worked out in your browser. It is not sent, and not kept.
        </p>
      </Passage>
    </article>
  );
}

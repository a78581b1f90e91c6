import type { Person } from './people';

/** The request that the page must hand back unchanged when somebody has chosen. */
export interface AuthorizationRequest {
  readonly clientId: string;
  readonly redirectUri: string;
  readonly scopes: readonly string[];
  readonly state: string | undefined;
  readonly codeChallenge: string | undefined;
}

function escape(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

function document(title: string, body: string): string {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escape(title)}</title>
<link rel="stylesheet" href="/style.css">
<link rel="icon" href="data:,">
</head>
<body>
<main>
${body}
</main>
</body>
</html>
`;
}

function hidden(name: string, value: string | undefined): string {
  return value === undefined ? '' : `<input type="hidden" name="${name}" value="${escape(value)}">`;
}

/** The page where one chooses who to be. */
export function choicePage(request: AuthorizationRequest, people: readonly Person[]): string {
  const application = new URL(request.redirectUri).host;
  const asks = request.scopes.some((scope) => scope === 'user' || scope === 'user:email')
    ? 'your name and your e-mail address'
    : 'your name';
  const choices = people
    .map(
      (person) =>
        `<li><button name="choose" value="${escape(person.login)}">` +
        `<span class="name">${escape(person.name)}</span> <span class="note">${escape(person.note)}</span></button></li>`,
    )
    .join('\n');
  return document(
    'Choose who you are',
    `<p class="kind">Local stand-in for GitHub</p>
<h1>Choose who you are</h1>
<p>This page takes the place of GitHub’s sign-in on this machine. There is no password and nothing leaves the machine; the people are invented.</p>
<p><strong>${escape(application)}</strong> asks for ${asks}.</p>
<form method="post" action="/login/oauth/authorize">
${hidden('client_id', request.clientId)}
${hidden('redirect_uri', request.redirectUri)}
${hidden('scope', request.scopes.join(' '))}
${hidden('state', request.state)}
${hidden('code_challenge', request.codeChallenge)}
${request.codeChallenge === undefined ? '' : hidden('code_challenge_method', 'S256')}
<ul>
${choices}
</ul>
<p><button class="refuse" name="refuse" value="yes">Don’t sign in</button></p>
</form>`,
  );
}

/** A page that says in one sentence why there is nothing to choose. */
export function refusalPage(sentence: string): string {
  return document(
    'This sign-in cannot go on',
    `<p class="kind">Local stand-in for GitHub</p>
<h1>This sign-in cannot go on</h1>
<p>${escape(sentence)}</p>`,
  );
}

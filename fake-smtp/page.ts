import { subjectOf, type TakenMessage } from './mailbox';

const style = `
:root { color-scheme: light dark; }
body { font: 16px/1.5 system-ui, sans-serif; max-width: 46rem; margin: 2rem auto; padding: 0 1rem; }
.kind, .note { color: GrayText; }
li { margin: 0.75rem 0; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; font: 15px/1.5 ui-monospace, monospace; border-top: 1px solid; padding-top: 1rem; }
dt { font-weight: 600; } dd { margin: 0 0 0.5rem; overflow-wrap: anywhere; }`;

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
<link rel="icon" href="data:,">
<style>${style}</style>
</head>
<body>
<p class="kind">Local mailbox: nothing leaves this machine</p>
${body}
</body>
</html>
`;
}

/** Every message that is kept, newest first. */
export function listPage(messages: readonly TakenMessage[]): string {
  const items = [...messages]
    .reverse()
    .map(
      (message) =>
        `<li><a href="/messages/${message.number}">${escape(subjectOf(message) || 'no subject')}</a><br>` +
        `<span class="note">to ${escape(message.envelopeTo.join(', '))}, ${escape(message.takenAt.toISOString())}</span></li>`,
    );
  const list = items.length === 0 ? '<p>No mail has come yet.</p>' : `<ul>\n${items.join('\n')}\n</ul>`;
  return document('Local mailbox', `<h1>Mail</h1>\n${list}`);
}

/** One message, its text as it reads and its headers as they came. */
export function messagePage(message: TakenMessage): string {
  const headers = message.headers
    .map(([name, value]) => `<dt>${escape(name)}</dt><dd>${escape(value)}</dd>`)
    .join('\n');
  return document(
    subjectOf(message),
    `<p><a href="/">All mail</a></p>
<h1>${escape(subjectOf(message))}</h1>
<p class="note">from ${escape(message.envelopeFrom)} to ${escape(message.envelopeTo.join(', '))}</p>
<pre>${escape(message.text)}</pre>
<h2>Headers</h2>
<dl>
${headers}
</dl>`,
  );
}

export function missingPage(): string {
  return document('No such mail', '<h1>No such mail</h1>\n<p><a href="/">All mail</a></p>');
}

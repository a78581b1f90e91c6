/** A message as a person reads it: enough of RFC 5322, 2045 and 2047 for plain text of one part. */
export interface ReadMessage {
  /** Every header in order, unfolded, encoded words decoded. */
  readonly headers: readonly (readonly [name: string, value: string])[];
  readonly text: string;
}

/** Reads the bytes of a message as they came over SMTP. */
export function readMessage(raw: Buffer): ReadMessage {
  // One byte a character, so that what is decoded below is still bytes.
  const whole = raw.toString('latin1');
  const gap = /\r?\n\r?\n/.exec(whole);
  const head = gap === null ? whole : whole.slice(0, gap.index);
  const body = gap === null ? '' : whole.slice(gap.index + gap[0].length);
  const headers = head
    .replace(/\r?\n(?=[ \t])/g, '')
    .split(/\r?\n/)
    .filter((line) => line !== '')
    .map((line): [string, string] => {
      const colon = line.indexOf(':');
      return colon === -1
        ? [line, '']
        : [line.slice(0, colon), decodeWords(utf8(line.slice(colon + 1).trim()))];
    });
  return { headers, text: utf8(decodeBody(body, headerOf(headers, 'Content-Transfer-Encoding') ?? '7bit')) };
}

/** The first header of a name, whatever its case. */
export function headerOf(headers: ReadMessage['headers'], name: string): string | undefined {
  return headers.find(([other]) => other.toLowerCase() === name.toLowerCase())?.[1];
}

function utf8(binary: string): string {
  return Buffer.from(binary, 'latin1').toString('utf8');
}

function decodeBody(body: string, encoding: string): string {
  switch (encoding.trim().toLowerCase()) {
    case 'base64':
      return Buffer.from(body, 'base64').toString('latin1');
    case 'quoted-printable':
      return decodeQuoted(body.replace(/=\r?\n/g, ''));
    default:
      return body;
  }
}

function decodeQuoted(text: string): string {
  return text.replace(/=([0-9A-F]{2})/gi, (_whole, hex: string) => String.fromCharCode(parseInt(hex, 16)));
}

/** `=?utf-8?Q?…?=` and `=?utf-8?B?…?=`; white space between two of them is theirs. */
function decodeWords(value: string): string {
  return value.replace(/(\?=)\s+(?==\?)/g, '$1').replace(/(?:=\?utf-8\?[bq]\?[^?]*\?=)+/gi, (words) => {
    const bytes = [...words.matchAll(/=\?utf-8\?([bq])\?([^?]*)\?=/gi)].map(([, kind = '', text = '']) =>
      kind.toLowerCase() === 'b'
        ? Buffer.from(text, 'base64').toString('latin1')
        : decodeQuoted(text.replaceAll('_', ' ')),
    );
    return utf8(bytes.join(''));
  });
}

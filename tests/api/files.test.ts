import { createHash, randomBytes, randomUUID } from 'node:crypto';
import http from 'node:http';
import { deflateSync } from 'node:zlib';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { fileSchema, maxFileBytes, plateDetailSchema, problemSchema } from '../../shared/schemas';
import { answered, call, upload } from './support/calls';
import { type Agent, chooseAtProvider, type Harness, startHarness, startSignIn } from './support/harness';
import { makeLab, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Lab of files');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const files = () => `/labs/${lab.labId}/files`;
const send = (content: string | Buffer, name?: string) => upload(harness, lead, files(), content, name);
const detailOf = (text: string) => problemSchema.parse(JSON.parse(text)).detail;

/** The smallest picture that the PNG standard (W3C, third edition) knows: its signature, a header and one grey pixel. */
function png(): Buffer {
  const chunk = (type: string, data: Buffer) => {
    const body = Buffer.concat([Buffer.from(type), data]);
    const length = Buffer.alloc(4);
    length.writeUInt32BE(data.length);
    return Buffer.concat([length, body, Buffer.alloc(4)]);
  };
  const header = Buffer.from([0, 0, 0, 1, 0, 0, 0, 1, 8, 0, 0, 0, 0]);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', header),
    chunk('IDAT', deflateSync(Buffer.from([0, 0]))),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

test('a file comes back byte for byte under its hash, to be saved and never to run', async () => {
  const content = Buffer.from('<script>alert(1)</script>\n0;1\n');
  const file = await answered(send(content, '../../é "x"\u0007.csv'), fileSchema);
  expect(file).toMatchObject({
    name: 'é "x".csv',
    mediaType: 'text/plain',
    sizeBytes: content.length,
    sha256: createHash('sha256').update(content).digest('hex'),
  });
  const back = await lead.get(`/api/v1${files()}/${file.id}`).buffer(true);
  expect(back.text).toBe(content.toString());
  expect(back.headers['content-type']).toBe('text/plain; charset=utf-8');
  expect(back.headers['content-disposition']).toBe(
    `attachment; filename="_ _x_.csv"; filename*=UTF-8''%C3%A9%20%22x%22.csv`,
  );
  expect(back.headers['content-security-policy']).toBe("sandbox; default-src 'none'");
  expect(back.headers['x-content-type-options']).toBe('nosniff');
  expect(back.headers['cache-control']).toBe('no-store');
});

test.each([
  ['an empty file', Buffer.alloc(0), 'is empty'],
  ['an archive of nothing', Buffer.from('504b0506' + '00'.repeat(18), 'hex'), 'ZIP (application/zip)'],
  ['a program', Buffer.concat([Buffer.from('7f454c4602010100', 'hex'), Buffer.alloc(64)]), 'ELF'],
  ['a page called a picture', Buffer.from('<?xml version="1.0"?><svg onload="x()"/>'), 'XML'],
  ['noise', Buffer.concat([Buffer.from([0, 1, 2, 3]), randomBytes(64)]), 'neither text'],
  ['a text with a null in it', Buffer.from('0,1\n\u0000'), 'neither text'],
])('%s is refused by what it is, whatever it is called', async (_name, content, words) => {
  const response = await send(content, 'scan.csv');
  expect([response.status, detailOf(response.text)]).toEqual([422, expect.stringContaining(words)]);
});

test('a picture is known by its content and can be a photo; a text cannot', async () => {
  const { id, mediaType } = await answered(send(png(), 'rim.csv'), fileSchema);
  expect(mediaType).toBe('image/png');
  const path = `/labs/${lab.labId}/plates/${lab.plateIds[0]}`;
  const attach = (fileId: string, kind: string) =>
    call(harness, lead, 'post', `${path}/files`, { body: { fileId, kind } });
  expect((await attach(id, 'photo')).status).toBe(201);
  expect(detailOf((await attach(lab.fileId, 'photo')).text)).toContain('is no picture');
  expect((await attach(randomUUID(), 'photo')).status).toBe(422);
  const shown = async () => {
    const { files: attached } = await answered(call(harness, lead, 'get', path), plateDetailSchema);
    return attached.map(({ name, kind }) => [name, kind]);
  };
  expect(await shown()).toEqual([
    ['rim.csv', 'photo'],
    ['scan.csv', 'data-sheet'],
  ]);
  expect((await call(harness, lead, 'delete', `${path}/files/${id}`)).status).toBe(204);
  expect((await call(harness, lead, 'delete', `${path}/files/${id}`)).status).toBe(404);
  expect(await shown()).toEqual([['scan.csv', 'data-sheet']]);
  expect((await call(harness, lead, 'get', `${files()}/${id}`)).status).toBe(200);
});

test('a file of another lab is not there, neither to read nor to attach', async () => {
  const other = await makeLab(harness, lead, 'Another lab');
  expect((await call(harness, lead, 'get', `/labs/${lab.labId}/files/${other.fileId}`)).status).toBe(404);
  const attach = await call(harness, lead, 'post', `/labs/${lab.labId}/plates/${lab.plateIds[0]}/files`, {
    body: { fileId: other.fileId, kind: 'data-sheet' },
  });
  expect(attach.status).toBe(422);
});

test('the largest file goes through and one byte more is refused, with the limit in words', async () => {
  expect((await send(Buffer.alloc(maxFileBytes, 0x20))).status).toBe(201);
  const over = await send(Buffer.alloc(maxFileBytes + 1, 0x20));
  expect([over.status, detailOf(over.text)]).toEqual([413, expect.stringContaining('larger than 10 MB')]);
});

/** A session's cookie by itself, for a request that no client library makes. */
async function cookieOfLead(): Promise<string> {
  const agent = harness.browser();
  const callback = await chooseAtProvider(await startSignIn(agent), 'adaeze-holm');
  const finished = await agent.get(callback.pathname + callback.search).redirects(0);
  const [cookie = ''] = z.array(z.string()).parse(finished.headers['set-cookie']);
  return cookie.split(';')[0] ?? '';
}

test('100 MB without a length are cut off, and the process stays small', async () => {
  const cookie = await cookieOfLead();
  const before = process.memoryUsage.rss();
  const status = await new Promise<number>((resolve, reject) => {
    const request = http.request(`${harness.origin}/api/v1${files()}?name=big.csv`, {
      method: 'POST',
      headers: {
        origin: harness.origin,
        cookie,
        'content-type': 'application/octet-stream',
        'idempotency-key': randomUUID(),
      },
    });
    request.on('response', (response) => {
      response.resume();
      resolve(response.statusCode ?? 0);
    });
    // The server may answer and close before all of it is sent.
    request.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code !== 'EPIPE' && error.code !== 'ECONNRESET') reject(error);
    });
    const block = Buffer.alloc(1024 * 1024, 0x20);
    let sent = 0;
    const more = () => {
      while (sent < 100) {
        sent += 1;
        if (!request.write(block)) {
          request.once('drain', more);
          return;
        }
      }
      request.end();
    };
    more();
  });
  expect(status).toBe(413);
  expect(process.memoryUsage.rss() - before).toBeLessThan(150 * 1024 * 1024);
});

test('an upload needs its own type, and nobody’s bytes are read before they have signed in', async () => {
  const json = await call(harness, lead, 'post', `${files()}?name=x.csv`, { body: { a: 1 } });
  expect(json.status).toBe(415);
  const stranger = await upload(harness, harness.browser(), files(), Buffer.alloc(maxFileBytes + 1));
  expect(stranger.status).toBe(401);
});

test('what is uploaded twice under one key is stored once', async () => {
  const key = randomUUID();
  const post = (content: string) =>
    lead
      .post(`/api/v1${files()}?name=a.csv`)
      .set('Origin', harness.origin)
      .set('Idempotency-Key', key)
      .set('Content-Type', 'application/octet-stream')
      .send(Buffer.from(content));
  const [first, again, other] = [await post('0,1\n'), await post('0,1\n'), await post('0,2\n')];
  expect([first.status, again.status, other.status]).toEqual([201, 201, 422]);
  expect(again.text).toBe(first.text);
});

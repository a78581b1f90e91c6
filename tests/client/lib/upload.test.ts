import { afterEach, describe, expect, it, vi } from 'vitest';
import { maxFileBytes, type StoredFile } from '../../../shared/schemas/files';
import { ApiError } from '../../../src/lib/api';
import { uploadFile } from '../../../src/lib/upload';
import { fakeUploads } from './fake-uploads';

const labId = '0190a000-0000-7000-8000-0000000000aa';
const stored: StoredFile = {
  id: '0190a000-0000-7000-8000-000000000001',
  name: 'scan of Q-B.csv',
  mediaType: 'text/plain',
  sha256: 'ab'.repeat(32),
  sizeBytes: 5,
  uploadedBy: 'Sami Oduya',
  uploadedAt: '2026-04-30T08:52:00.000Z',
};
const scan = new File(['0;1.0'], 'scan of Q-B.csv', { type: 'text/csv' });

afterEach(() => {
  vi.unstubAllGlobals();
});

async function refusalOf(upload: Promise<StoredFile>): Promise<ApiError> {
  const error: unknown = await upload.then(
    () => null,
    (reason: unknown) => reason,
  );
  if (!(error instanceof ApiError)) throw new Error('the upload was not refused');
  return error;
}

describe('a file that is uploaded', () => {
  it('goes as its own bytes under its name, says how much of it has left, and comes back as it is stored', async () => {
    const uploads = fakeUploads();
    const shares: number[] = [];
    const upload = uploadFile(labId, scan, { onProgress: (share) => shares.push(share) });
    const sent = uploads.latest();
    expect(sent).toMatchObject({
      method: 'POST',
      url: `/api/v1/labs/${labId}/files?name=scan%20of%20Q-B.csv`,
      body: scan,
    });
    expect(sent.headers.get('content-type')).toBe('application/octet-stream');
    expect(sent.headers.get('idempotency-key')).toMatch(/^[0-9a-f]{32}$/);
    sent.progress(2, 5);
    sent.progress(5, 5);
    sent.answer(201, stored);
    expect(await upload).toEqual(stored);
    expect(shares).toEqual([0.4, 1]);
  });

  it('is not sent where it is empty or larger than is kept, and the reason names it', async () => {
    const uploads = fakeUploads();
    const empty = await refusalOf(uploadFile(labId, new File([], 'empty.csv')));
    expect(empty.message).toBe('empty.csv is empty. Choose the file again.');
    const large = new File([new Uint8Array(maxFileBytes + 1)], 'large.png');
    expect((await refusalOf(uploadFile(labId, large))).message).toMatch(
      /^large\.png has 10\.0 MB, and 10 MB/,
    );
    expect(uploads.count()).toBe(0);
  });

  it('is refused in the server’s own words', async () => {
    const uploads = fakeUploads();
    const upload = uploadFile(labId, scan);
    const detail = 'scan of Q-B.csv is ZIP (application/zip). Send plain text.';
    uploads
      .latest()
      .answer(422, { type: 'about:blank', title: 'Refused', status: 422, detail, requestId: 'r' });
    expect(await refusalOf(upload)).toMatchObject({ status: 422, message: detail });
  });

  it('is no stored file where a proxy answers in the server’s place', async () => {
    const uploads = fakeUploads();
    const upload = uploadFile(labId, scan);
    uploads.latest().answer(200, '<html>Sign in to the guest network</html>');
    expect((await refusalOf(upload)).problem).toBeNull();
  });

  it('says that nothing was stored when the network is lost', async () => {
    const uploads = fakeUploads();
    const upload = uploadFile(labId, scan);
    uploads.latest().loseNetwork();
    expect(await refusalOf(upload)).toMatchObject({ status: 0 });
  });

  it('stops when it is cancelled, before or while it is sent', async () => {
    const uploads = fakeUploads();
    const before = uploadFile(labId, scan, { signal: AbortSignal.abort() });
    await expect(before).rejects.toMatchObject({ name: 'AbortError' });
    expect(uploads.count()).toBe(0);
    const cancel = new AbortController();
    const under = uploadFile(labId, scan, { signal: cancel.signal });
    cancel.abort();
    await expect(under).rejects.toMatchObject({ name: 'AbortError' });
    expect(uploads.count()).toBe(1);
  });
});

import { fileSchema, maxFileBytes, type StoredFile } from '../../shared/schemas/files';
import { ApiError, newIdempotencyKey, refusal } from './api';

/** As the limit is said before a file is chosen: "10 MB". */
export const maxFileWords = `${maxFileBytes / 1024 / 1024} MB`;

interface UploadOptions {
  /** How much of the file has left, from 0 to 1. */
  readonly onProgress?: ((share: number) => void) | undefined;
  /** Stops the upload; nothing is stored then. */
  readonly signal?: AbortSignal | undefined;
}

/** Why a file need not be sent at all; null where it may be. */
function refusedUnsent(file: File): string | null {
  if (file.size === 0) return `${file.name} is empty. Choose the file again.`;
  if (file.size <= maxFileBytes) return null;
  const size = (file.size / 1024 / 1024).toFixed(1);
  return `${file.name} has ${size} MB, and ${maxFileWords} is the most that is kept of one file. Choose a smaller one.`;
}

/**
 * Sends one file to the lab as it is. By XMLHttpRequest, since `fetch` does not say how much of a body has left.
 * @throws ApiError where it was refused, here or by the server, or never arrived; an AbortError once `signal` was.
 */
export function uploadFile(labId: string, file: File, options: UploadOptions = {}): Promise<StoredFile> {
  const { onProgress, signal } = options;
  const unsent = refusedUnsent(file);
  if (unsent !== null) return Promise.reject(new ApiError(413, null, unsent));
  return new Promise((resolve, reject) => {
    const cancelled = () => new DOMException('The upload was cancelled.', 'AbortError');
    if (signal?.aborted === true) {
      reject(cancelled());
      return;
    }
    const sending = new XMLHttpRequest();
    const stop = () => sending.abort();
    signal?.addEventListener('abort', stop, { once: true });
    const settle = (answer: () => void) => () => {
      signal?.removeEventListener('abort', stop);
      answer();
    };
    sending.upload.addEventListener('progress', ({ loaded, total }) => {
      if (total > 0) onProgress?.(loaded / total);
    });
    sending.addEventListener(
      'load',
      settle(() => {
        const stored = sending.status < 300 ? readStored(sending.responseText) : null;
        if (stored === null) reject(refusal(sending.status, sending.responseText));
        else resolve(stored);
      }),
    );
    sending.addEventListener(
      'error',
      settle(() =>
        reject(
          new ApiError(
            0,
            null,
            `The server cannot be reached, so ${file.name} was not stored. Check the network and send it again.`,
          ),
        ),
      ),
    );
    sending.addEventListener(
      'abort',
      settle(() => reject(cancelled())),
    );
    sending.open('POST', `/api/v1/labs/${labId}/files?name=${encodeURIComponent(file.name)}`);
    sending.setRequestHeader('accept', 'application/json');
    sending.setRequestHeader('content-type', 'application/octet-stream');
    sending.setRequestHeader('idempotency-key', newIdempotencyKey());
    sending.send(file);
  });
}

function readStored(text: string): StoredFile | null {
  try {
    return fileSchema.safeParse(JSON.parse(text)).data ?? null;
  } catch {
    return null;
  }
}

/** Where a stored file is fetched from. */
export function fileAddress(labId: string, fileId: string): string {
  return `/api/v1/labs/${labId}/files/${fileId}`;
}

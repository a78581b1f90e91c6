import { vi } from 'vitest';

/** One upload that a page has begun; a test says how it goes on. */
export class FakeUpload extends EventTarget {
  readonly upload = new EventTarget();
  readonly headers = new Map<string, string>();
  method = '';
  url = '';
  body: unknown = null;
  status = 0;
  responseText = '';

  open(method: string, url: string): void {
    this.method = method;
    this.url = url;
  }

  setRequestHeader(name: string, value: string): void {
    this.headers.set(name, value);
  }

  send(body: unknown): void {
    this.body = body;
    begun.push(this);
  }

  abort(): void {
    this.dispatchEvent(new Event('abort'));
  }

  /** So much of the file has left. */
  progress(loaded: number, total: number): void {
    this.upload.dispatchEvent(new ProgressEvent('progress', { lengthComputable: true, loaded, total }));
  }

  answer(status: number, body: unknown): void {
    this.status = status;
    this.responseText = typeof body === 'string' ? body : JSON.stringify(body);
    this.dispatchEvent(new Event('load'));
  }

  loseNetwork(): void {
    this.dispatchEvent(new Event('error'));
  }
}

let begun: FakeUpload[] = [];

/** Puts the fake in XMLHttpRequest's place until globals are put back. @returns the uploads as they begin. */
export function fakeUploads(): { readonly latest: () => FakeUpload; readonly count: () => number } {
  begun = [];
  vi.stubGlobal('XMLHttpRequest', FakeUpload);
  return {
    latest: () => {
      const last = begun.at(-1);
      if (last === undefined) throw new Error('no upload has begun');
      return last;
    },
    count: () => begun.length,
  };
}

import { QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';
import type { Role } from '../../../shared/permissions';
import type { PlateDetail } from '../../../shared/schemas/cabinet';
import type { CalibrationDetail, ScanColumns } from '../../../shared/schemas/scans';
import { LabContext } from '../../../src/features/labs';
import { answerScan, type ScanRequest } from '../../../src/features/scan/answer-scan';
import { Component as ScanPage } from '../../../src/features/scan/ScanPage';
import { createQueryClient } from '../../../src/lib/query-client';
import { cabinet, lab } from '../cabinet/cabinet-harness';
import { plateFixture, seatFixture } from '../cabinet/plate-fixture';

// jsdom's files can't be read as buffers.
if (!('arrayBuffer' in Blob.prototype)) {
  Object.defineProperty(Blob.prototype, 'arrayBuffer', {
    value(this: Blob): Promise<unknown> {
      return new Promise((resolve) => {
        const reader = new FileReader();
        reader.addEventListener('load', () => resolve(reader.result));
        reader.readAsArrayBuffer(this);
      });
    },
  });
}

/** The scan's worker on this thread. */
export class NearWorker extends EventTarget {
  static count = 0;
  private isEnded = false;
  constructor() {
    super();
    NearWorker.count += 1;
  }
  postMessage(request: ScanRequest): void {
    setTimeout(() => {
      if (this.isEnded) return;
      this.dispatchEvent(new MessageEvent('message', { data: answerScan(request) }));
    });
  }
  terminate(): void {
    this.isEnded = true;
  }
}

export interface Sent {
  readonly method: string;
  readonly path: string;
  readonly body: unknown;
}

interface Served {
  readonly detail?: PlateDetail;
  readonly remembered?: ScanColumns | null;
  readonly recorded?: CalibrationDetail;
  readonly file?: string;
  readonly extinction?: number | null;
  /** What recording is answered with. */
  readonly answer?: { readonly status: number; readonly body: unknown };
}

export const plate = plateFixture({ calibration: { offsetDeg: 121.7, retardanceDeg: 87 } });
export const detailOf = (change: Partial<PlateDetail> = {}): PlateDetail => ({
  plate,
  seats: [seatFixture(1)],
  calibrations: [],
  files: [],
  ...change,
});
export const fileId = '0190a000-0000-7000-8000-0000000000f1';
export const page = `${cabinet}/${plate.id}`;

/** Stands in for the server. */
function serve({
  detail = detailOf(),
  remembered = null,
  recorded,
  file = '',
  extinction = null,
  answer,
}: Served) {
  const sent: Sent[] = [];
  vi.stubGlobal('fetch', (url: string, init: RequestInit = {}) => {
    const path = url.replace(`/api/v1/labs/${lab.id}`, '');
    const method = init.method ?? 'GET';
    sent.push({ method, path, body: typeof init.body === 'string' ? JSON.parse(init.body) : null });
    if (path.includes('/files/')) return Promise.resolve(new Response(file));
    const body = path.startsWith('/scan-columns')
      ? { columns: remembered }
      : path.startsWith('/benches/')
        ? { name: 'signal arm', polariserExtinction: extinction, wavelengthNm: 810 }
        : path.includes('/calibrations/')
          ? recorded
          : detail;
    const answered =
      method === 'POST' ? (answer ?? { status: 201, body: { id: 'new' } }) : { status: 200, body };
    return Promise.resolve(new Response(JSON.stringify(answered.body), { status: answered.status }));
  });
  let uploads = 0;
  vi.stubGlobal(
    'XMLHttpRequest',
    class extends EventTarget {
      readonly upload = new EventTarget();
      status = 201;
      responseText = '';
      open(): void {
        uploads += 1;
      }
      setRequestHeader(): void {
        // Nothing of the headers is looked at here.
      }
      abort(): void {
        this.dispatchEvent(new Event('abort'));
      }
      send(body: File): void {
        this.responseText = JSON.stringify({
          id: fileId,
          name: body.name,
          mediaType: 'text/plain',
          sha256: 'ab',
          sizeBytes: body.size,
          uploadedBy: 'Adaeze Holm',
          uploadedAt: '2026-11-01T09:00:00.000Z',
        });
        setTimeout(() => this.dispatchEvent(new Event('load')));
      }
    },
  );
  return { sent, uploads: () => uploads };
}

/** Opens the scan's page as somebody of this role. */
export function openScan(role: Role, served: Served = {}, query = '') {
  vi.stubGlobal('Worker', NearWorker);
  const server = serve(served);
  const user = {
    id: '0190a000-0000-7000-8000-0000000000bb',
    name: 'Adaeze Holm',
    login: 'aholm',
    email: null,
  };
  const router = createMemoryRouter(
    [
      { path: `${cabinet}/:plateId/scan`, element: <ScanPage /> },
      { path: '*', element: <p>another page</p> },
    ],
    { initialEntries: [`${page}/scan${query}`] },
  );
  render(
    <QueryClientProvider client={createQueryClient()}>
      <LabContext value={{ lab, user, member: { userId: user.id, labId: lab.id, role } }}>
        <RouterProvider router={router} />
      </LabContext>
    </QueryClientProvider>,
  );
  return { ...server, router, user: userEvent.setup() };
}

export const csv = (text: string, name = 'scan.csv'): File => new File([text], name, { type: 'text/csv' });

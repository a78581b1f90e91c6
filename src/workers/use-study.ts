import { useCallback, useEffect, useRef, useState } from 'react';
import type { ResultOf, StudyAnswer, StudyRequest, StudyResult } from './study-messages';

export type StudyState<Kind extends StudyRequest['kind']> =
  | { readonly state: 'idle' }
  | { readonly state: 'working'; readonly share: number }
  | { readonly state: 'done'; readonly result: ResultOf<Kind> }
  | { readonly state: 'failed'; readonly sentence: string };

function startWorker(): Worker {
  return new Worker(new URL('./study.worker.ts', import.meta.url), { type: 'module' });
}

function isOf<Kind extends StudyRequest['kind']>(kind: Kind, result: StudyResult): result is ResultOf<Kind> {
  return result.kind === kind;
}

/**
 * Long work off the main thread. `start` ends what runs and begins anew; `cancel` ends it at once. A worker lives as long as
 * its work, so that cancelling needs nobody's consent.
 */
export function useStudy<Kind extends StudyRequest['kind']>(kind: Kind) {
  const [study, setStudy] = useState<StudyState<Kind>>({ state: 'idle' });
  const worker = useRef<Worker | null>(null);

  const end = useCallback(() => {
    worker.current?.terminate();
    worker.current = null;
  }, []);

  const start = useCallback(
    (request: Extract<StudyRequest, { readonly kind: Kind }>) => {
      end();
      const started = startWorker();
      worker.current = started;
      setStudy({ state: 'working', share: 0 });
      started.addEventListener('message', ({ data }: MessageEvent<StudyAnswer>) => {
        if (worker.current !== started) return;
        if (data.state === 'working' || data.state === 'failed') setStudy(data);
        else if (isOf(kind, data.result)) setStudy({ state: 'done', result: data.result });
        if (data.state !== 'working') end();
      });
      started.addEventListener('error', () => {
        if (worker.current !== started) return;
        setStudy({ state: 'failed', sentence: 'The calculation stopped. Load the page again.' });
        end();
      });
      started.postMessage(request);
    },
    [kind, end],
  );

  const cancel = useCallback(() => {
    end();
    setStudy({ state: 'idle' });
  }, [end]);

  useEffect(() => end, [end]);
  return { study, start, cancel };
}

import { useEffect, useRef, useState } from 'react';
import type { QuickBench, QuickSettings, Written } from './quick-settings';

/** One question: what is written, and the plates to make it with; null for exact ones. */
export interface QuickJob {
  readonly written: Written;
  readonly quick: QuickBench | null;
}

export interface Answered<Asked extends QuickJob> {
  readonly asked: Asked;
  readonly settings: QuickSettings;
}

/** What comes sooner needs no words. */
const lateAfterMs = 200;

const stopped: QuickSettings = { ok: false, sentence: 'The calculation stopped. Load the page again.' };

/** One worker that is asked one question at a time; of those that come meanwhile only the last one matters. */
class Line<Asked extends QuickJob> {
  private worker: Worker | null = null;
  private running: Asked | null = null;
  private next: Asked | null = null;

  constructor(private readonly onAnswer: (answered: Answered<Asked>) => void) {}

  ask(asked: Asked): void {
    this.next = asked;
    if (this.running === null) this.go();
  }

  end(): void {
    this.worker?.terminate();
    this.worker = null;
    this.running = null;
    this.next = null;
  }

  private go(): void {
    const asked = this.next;
    this.next = null;
    this.running = asked;
    if (asked === null) return;
    this.worker ??= this.start();
    const { written, quick } = asked;
    this.worker.postMessage({ written, quick });
  }

  private start(): Worker {
    const worker = new Worker(new URL('./quick.worker.ts', import.meta.url), { type: 'module' });
    worker.addEventListener('message', ({ data }: MessageEvent<QuickSettings | null>) => {
      if (this.worker === worker) this.answer(data);
    });
    worker.addEventListener('error', () => {
      if (this.worker !== worker) return;
      worker.terminate();
      this.worker = null;
      this.answer(stopped);
    });
    return worker;
  }

  private answer(settings: QuickSettings | null): void {
    if (this.running !== null && settings !== null) this.onAnswer({ asked: this.running, settings });
    this.go();
  }
}

/**
 * Settings worked out aside. The last answer stands, with the question that it answers, until the next is there.
 * `asked` is a new question when it is another object; null asks for nothing.
 */
export function useQuickSettings<Asked extends QuickJob>(
  asked: Asked | null,
): { readonly answered: Answered<Asked> | null; readonly isLate: boolean } {
  const [answered, setAnswered] = useState<Answered<Asked> | null>(null);
  const [late, setLate] = useState<Asked | null>(null);
  const line = useRef<Line<Asked> | null>(null);
  useEffect(() => {
    const begun = new Line<Asked>(setAnswered);
    line.current = begun;
    return () => begun.end();
  }, []);
  useEffect(() => {
    if (asked === null) return;
    line.current?.ask(asked);
    const timer = setTimeout(() => setLate(asked), lateAfterMs);
    return () => clearTimeout(timer);
  }, [asked]);
  return { answered, isLate: late !== null && late === asked && answered?.asked !== asked };
}

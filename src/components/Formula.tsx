import { useEffect, useRef, useState } from 'react';
import { classNames } from './class-names';
import { drawInTurn } from '../lib/draw-in-turn';
// With the page and not with KaTeX: all that stands on a page is laid out anew when a sheet with fonts comes in.
import 'katex/dist/katex.min.css';

interface FormulaProps {
  readonly latex: string;
  /** What stands there until KaTeX has come, and what is copied: the expression as it was typed. */
  readonly source?: string | undefined;
  readonly className?: string | undefined;
}

/**
 * An expression typeset by KaTeX, which is fetched with the first formula. `render` builds its nodes through the DOM, so that the
 * styles it sets pass a policy that forbids inline ones; MathML stays in for screen readers.
 */
export function Formula({ latex, source, className }: FormulaProps) {
  const target = useRef<HTMLSpanElement>(null);
  const [drawn, setDrawn] = useState<string | null>(null);

  useEffect(() => {
    let gone = false;
    let takeBack: (() => void) | null = null;
    // No network, or an expression KaTeX can't set: the source text says the same.
    const keepSource = () => {
      if (!gone) setDrawn(null);
    };
    const load = async (): Promise<void> => {
      const { default: katex } = await import('katex');
      if (gone) return;
      takeBack = drawInTurn(() => {
        if (target.current === null) return;
        try {
          katex.render(latex, target.current, {
            throwOnError: true,
            output: 'htmlAndMathml',
            strict: 'ignore',
          });
          setDrawn(latex);
        } catch {
          keepSource();
        }
      });
    };
    load().catch(keepSource);
    return () => {
      gone = true;
      takeBack?.();
    };
  }, [latex]);

  const ready = drawn === latex;
  return (
    <span className={classNames('whitespace-nowrap', className)}>
      <span ref={target} className={ready ? undefined : 'hidden'} />
      {!ready && <span className="font-mono">{source ?? latex}</span>}
    </span>
  );
}

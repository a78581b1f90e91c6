import { type ReactNode, useState } from 'react';
import { BeamLine } from './BeamLine';
import { TextButton } from './TextLink';
import { timeLeftWords, useWorkClock } from './use-work-clock';

interface Words {
  /** One plain sentence. */
  readonly title: ReactNode;
  /** What it means, and one way on. */
  readonly children?: ReactNode;
  readonly className?: string | undefined;
}

/** Nothing here yet. */
export function BeamEmpty({ title, children, className }: Words) {
  return (
    <div className={className}>
      <BeamLine state={{ kind: 'empty' }} />
      <Text title={title}>{children}</Text>
    </div>
  );
}

/** Something can't go on: what, where, and what to do. */
export function BeamWrong({
  title,
  children,
  className,
  share,
}: Words & { readonly share?: number | undefined }) {
  return (
    <div className={className} role="alert">
      <BeamLine state={{ kind: 'wrong', share }} />
      <Text title={title}>{children}</Text>
    </div>
  );
}

/** No way to the server. What is known stays readable. */
export function BeamCutOff({ title, children, className }: Words) {
  return (
    <div className={className} role="status">
      <BeamLine state={{ kind: 'cut-off' }} />
      <Text title={title}>{children}</Text>
    </div>
  );
}

interface BeamWorkingProps extends Omit<Words, 'title'> {
  /** What is being done: "Solving". */
  readonly doing: string;
  /** What is counted: "row". Without done and total only the work itself is named. */
  readonly unit?: string | undefined;
  readonly done?: number | undefined;
  readonly total?: number | undefined;
  readonly onCancel?: (() => void) | undefined;
  /** For a page that shows states side by side. */
  readonly atOnce?: boolean | undefined;
}

/** Work in progress. Silent for 300 ms; past 10 s it says how long it will take and how to stop it. The light never goes back. */
export function BeamWorking({
  doing,
  unit,
  done,
  total,
  onCancel,
  atOnce = false,
  children,
  className,
}: BeamWorkingProps) {
  const { shown, long, elapsedMs } = useWorkClock();
  const counted = done !== undefined && total !== undefined && total > 0;
  const share = counted ? done / total : null;
  const [furthest, setFurthest] = useState(share);
  if (share !== null && (furthest === null || share > furthest)) setFurthest(share);
  if (!shown && !atOnce) return null;
  const title = counted ? `${doing}, ${unit ?? 'part'} ${done} of ${total}` : doing;
  const left = counted && long ? timeLeftWords(elapsedMs, done, total) : null;
  return (
    <div className={className}>
      <div
        role="progressbar"
        aria-label={doing}
        aria-valuetext={title}
        {...(counted ? { 'aria-valuemin': 0, 'aria-valuemax': total, 'aria-valuenow': done } : {})}
      >
        <BeamLine state={{ kind: 'working', share: furthest }} />
      </div>
      <Text title={title}>{children}</Text>
      {(left !== null || (long && onCancel !== undefined)) && (
        <p className="mt-2 flex flex-wrap gap-x-4 text-s text-ink-2">
          {left}
          {long && onCancel !== undefined && <TextButton onClick={onCancel}>Cancel</TextButton>}
        </p>
      )}
    </div>
  );
}

function Text({ title, children }: { readonly title: ReactNode; readonly children?: ReactNode }) {
  return (
    <>
      <p className="mt-2.5 text-[0.9375rem] leading-5.5 font-section">{title}</p>
      {children !== undefined && <div className="mt-0.5 text-s text-ink-2">{children}</div>}
    </>
  );
}

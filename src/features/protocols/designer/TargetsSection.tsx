import { type ComponentProps, type ReactNode, type RefObject, useEffect, useRef, useState } from 'react';
import { drawAlone } from '../../../lib/draw-in-turn';
import { FindTarget } from './FindTarget';
import { TargetsTable } from './TargetsTable';
import { selectedRow } from './use-row-actions';

interface TargetsSectionProps extends Omit<ComponentProps<typeof TargetsTable>, 'region'> {
  readonly findField: RefObject<HTMLInputElement | null>;
  /** What else can be done with the rows. */
  readonly children: ReactNode;
}

/** The targets in a region of their own that scrolls, so that the stage stays in sight of a long list, and under it the ways through it. */
export function TargetsSection({ findField, children, ...table }: TargetsSectionProps) {
  const scroller = useRef<HTMLDivElement>(null);
  const [region, setRegion] = useState<HTMLDivElement | null>(null);
  // Told once it is painted: the table asks the region at once for its size, which by then costs no layout.
  useEffect(() => drawAlone(() => setRegion(scroller.current)), []);
  return (
    <>
      <div ref={scroller} className="targets-scroll" tabIndex={0} role="region" aria-label="Targets">
        <TargetsTable {...table} region={region} />
      </div>
      <div className="targets-ways">
        {table.targets.length > 1 && (
          <FindTarget
            field={findField}
            targets={table.targets}
            onLeave={() => region?.querySelector<HTMLElement>(selectedRow)?.focus()}
          />
        )}
        {children}
      </div>
    </>
  );
}

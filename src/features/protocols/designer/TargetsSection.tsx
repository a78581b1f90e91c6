import { type ComponentProps, type ReactNode, type RefObject, useState } from 'react';
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
  const [region, setRegion] = useState<HTMLDivElement | null>(null);
  return (
    <>
      <div ref={setRegion} className="targets-scroll" tabIndex={0} role="region" aria-label="Targets">
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

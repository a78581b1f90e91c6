import { type NavPerson, type PersonActions, PersonPanel } from './PersonPanel';
import { useDisclosure } from './use-disclosure';

interface PersonMenuProps extends PersonActions {
  readonly person: NavPerson;
}

/** The stop at the end of the beam: the person. */
export function PersonMenu({ person, ...actions }: PersonMenuProps) {
  const { open, panelId, rootRef, buttonRef, toggle } = useDisclosure();
  return (
    <div ref={rootRef} className="relative h-full">
      <button
        ref={buttonRef}
        type="button"
        aria-expanded={open}
        aria-controls={panelId}
        onClick={toggle}
        className="absolute top-3.5 right-0 block h-12.5 min-w-11 text-right"
      >
        <span className="block text-[0.875rem] leading-5.5 whitespace-nowrap text-ink-2">{person.name}</span>
        <span className="block pt-1 font-mono text-s leading-5.5 font-strong text-ink" aria-hidden="true">
          {person.initials}
        </span>
        <span className="sr-only">, your account</span>
      </button>
      {/* The bar that stops the beam. */}
      <span
        aria-hidden="true"
        className="pointer-events-none absolute top-[37px] right-7.5 h-6.5 w-[2.4px] bg-ink"
      />
      <div
        id={panelId}
        hidden={!open}
        className="absolute top-18 right-0 z-30 w-84 border border-ink bg-paper p-4 text-left"
      >
        <PersonPanel {...actions} />
      </div>
    </div>
  );
}

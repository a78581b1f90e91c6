import { SectionHead } from '../../components/SectionHead';
import { TextLink } from '../../components/TextLink';
import { useLab } from '../labs';
import { ExportSection } from './ExportSection';
import { ImportSection } from './ImportSection';

/** The cabinet as a file: out for everyone, in for those who keep it. */
export function Component() {
  const { lab, may } = useLab();
  return (
    <>
      <title>Import and export · Quarterturn</title>
      <header className="mb-5 flex flex-wrap items-baseline gap-x-5 gap-y-2 pt-2">
        <h1 className="text-title">Import and export</h1>
        <p className="text-ink-2">The cabinet as a file.</p>
        <nav aria-label="Cabinet" className="flex flex-wrap gap-x-5 gap-y-2 sm:ml-auto">
          <TextLink to={`/labs/${lab.id}/cabinet`}>Plates</TextLink>
          <TextLink to={`/labs/${lab.id}/cabinet/mounts`}>Mounts</TextLink>
        </nav>
      </header>
      <div className="grid grid-cols-1 gap-10">
        <ExportSection labId={lab.id} />
        <section aria-labelledby="import">
          <SectionHead id="import">Import</SectionHead>
          {may('cabinet.write') ? (
            <>
              <p className="mt-2 mb-5 max-w-[90ch]">
                A file is looked at first, and what it would change is shown before anything is. Plates and
                mounts are matched by name. An import adds and corrects; it removes nothing, and changes
                nothing that was measured.
              </p>
              <ImportSection labId={lab.id} />
            </>
          ) : (
            <p className="mt-2 max-w-[90ch]">
              Designers and leads import plates. Ask the lab’s lead for that role.
            </p>
          )}
        </section>
      </div>
    </>
  );
}

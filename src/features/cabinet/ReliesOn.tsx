import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { TextLink } from '../../components/TextLink';
import { useLab } from '../labs';

/** The benches whose beam goes through a plate, and what that means for whoever changes it. */
export function ReliesOn({ plate }: { readonly plate: CabinetPlate }) {
  const { lab } = useLab();
  const headId = `relies-on-${plate.id}`;
  return (
    <section aria-labelledby={headId} className="border-ink mt-6 border-t-[1.5px] pt-3">
      <h3 id={headId} className="text-section">
        What relies on {plate.name}
      </h3>
      {plate.benches.length === 0 ? (
        <p className="text-ink-2">No bench has it in its beam.</p>
      ) : (
        <>
          <p className="text-s text-ink-2">
            Drafts for {plate.benches.length === 1 ? 'this bench' : 'these benches'} solve with its newest
            calibration.
          </p>
          <ul>
            {plate.benches.map(({ id, name }) => (
              <li key={id} className="border-hair flex items-baseline justify-between gap-4 border-b py-2">
                <span className="font-strong">{name}</span>
                <TextLink to={`/labs/${lab.id}/bench`}>
                  See the bench<span className="sr-only"> {name}</span>
                </TextLink>
              </li>
            ))}
          </ul>
        </>
      )}
    </section>
  );
}

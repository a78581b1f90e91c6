import { ButtonLink } from '../../components/Button';
import { SectionHead } from '../../components/SectionHead';
import { exportAddress } from './queries';

/** The whole cabinet as a file, for everyone who may see it. */
export function ExportSection({ labId }: { readonly labId: string }) {
  return (
    <section aria-labelledby="export">
      <SectionHead id="export">Export</SectionHead>
      <p className="mt-2 max-w-[90ch]">
        Every mount and plate with its seats and calibrations, the retired ones too. CSV opens in a
        spreadsheet, JSON is for programs; either can be imported again, exactly. Scans, fits, photos and data
        sheets are not in it.
      </p>
      <p className="mt-3 flex flex-wrap gap-4">
        <ButtonLink to={exportAddress(labId, 'csv')} reloadDocument download>
          Save the cabinet as CSV
        </ButtonLink>
        <ButtonLink to={exportAddress(labId, 'json')} reloadDocument download>
          Save the cabinet as JSON
        </ButtonLink>
      </p>
    </section>
  );
}

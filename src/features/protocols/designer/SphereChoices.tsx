import { SegmentedChoice } from '../../../components/SegmentedChoice';
import { SelectField } from '../../../components/SelectField';
import { followedLights, type SphereOverlay, useDesignerView } from './view-store';

const pathOnly = { value: 'none', label: 'the path' } as const;
const phase = { value: 'phase', label: 'its phase' } as const;
const images = { value: 'images', label: 'six states' } as const;
const reach = { value: 'reach', label: 'out of reach' } as const;

interface SphereChoicesProps {
  readonly kind: 'state' | 'unitary';
  readonly plateCount: number;
  /** Share of the map of what two plates can make that is worked out; null while none is. */
  readonly progress: number | null;
}

/** What the sphere shows besides the path; of a unitary, also which light is followed. */
export function SphereChoices({ kind, plateCount, progress }: SphereChoicesProps) {
  const { overlay, showOverlay, followed, follow } = useDesignerView();
  const segments: { readonly value: SphereOverlay; readonly label: string }[] = [pathOnly, phase];
  if (kind === 'unitary') segments.push(images);
  if (kind === 'state' && plateCount === 2) segments.push(reach);
  const shown = segments.some(({ value }) => value === overlay) ? overlay : 'none';
  return (
    <div className="mb-2 flex flex-wrap items-end gap-3">
      {kind === 'unitary' && (
        <SelectField
          label="follow"
          className="w-24"
          value={followed}
          options={followedLights.map((value) => ({ value, label: value }))}
          onChange={(event) => {
            const light = followedLights.find((name) => name === event.target.value);
            if (light !== undefined) follow(light);
          }}
        />
      )}
      <SegmentedChoice label="on the sphere" value={shown} onChange={showOverlay} segments={segments} />
      {progress !== null && (
        <p role="status" className="m-0 text-s text-ink-2">
          mapping what these plates reach, {Math.round(progress * 100)} %
        </p>
      )}
    </div>
  );
}

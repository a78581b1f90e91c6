import type { FieldErrors } from 'react-hook-form';
import type { PlateValues } from './plate-form-values';
import type { PlateFieldName } from './PlateFields';

/** The sentence at one field of a plate, wherever the form keeps it. */
export function plateFault(errors: FieldErrors<PlateValues>, name: PlateFieldName): string | undefined {
  switch (name) {
    case 'mount.name':
      return errors.mount?.name?.message;
    case 'mount.resolutionDeg':
      return errors.mount?.resolutionDeg?.message;
    case 'mount.repeatabilityDeg':
      return errors.mount?.repeatabilityDeg?.message;
    case 'mount.rangeFromDeg':
      return errors.mount?.rangeFromDeg?.message;
    case 'mount.rangeToDeg':
      return errors.mount?.rangeToDeg?.message;
    case 'mount.speedDegPerS':
      return errors.mount?.speedDegPerS?.message;
    case 'mount.backlashDeg':
      return errors.mount?.backlashDeg?.message;
    case 'mount.approach':
      return errors.mount?.approach?.message;
    default:
      return errors[name]?.message;
  }
}

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
    default:
      return errors[name]?.message;
  }
}

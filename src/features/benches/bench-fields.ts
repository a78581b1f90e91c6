import type { Path } from 'react-hook-form';
import type { BenchValues, TypedField } from './bench-form-values';

/** The fields as their labels name them. */
export const fieldNames: Readonly<Record<TypedField, string>> = {
  name: 'bench’s name',
  wavelengthNm: 'wavelength, nm',
  wavelengthSigmaNm: 'its σ, nm',
  temperatureC: 'temperature of the plates, °C',
  temperatureSigmaK: 'its σ, K',
  inputExpression: 'state behind the polariser',
  polariserSigmaDeg: 'σ of the polariser’s angle, degrees',
  polariserExtinction: 'extinction of the polariser',
  laserClass: 'laser class (IEC 60825-1)',
  hazardWavelengthsNm: 'wavelengths that can reach an eye, nm',
  passedName: 'passed port: detector’s name',
  passedDarkPerS: 'passed port: dark rate, per second',
  rejectedName: 'rejected port: detector’s name',
  rejectedDarkPerS: 'rejected port: dark rate, per second',
  efficiencyRatio: 'efficiency, rejected over passed',
};

/** Parts of the request whose field has another name in the form. */
const detectorFields: Readonly<Record<string, TypedField>> = {
  'detectors.passed.name': 'passedName',
  'detectors.passed.darkRatePerS': 'passedDarkPerS',
  'detectors.rejected.name': 'rejectedName',
  'detectors.rejected.darkRatePerS': 'rejectedDarkPerS',
  'detectors.efficiencyRatio': 'efficiencyRatio',
};

/** The form's field for a part of the request, as the schema and the server name it; null where the form has none. */
export function fieldOf(path: string): Path<BenchValues> | null {
  if (path === 'name' || path === 'inputExpression') return path;
  if (path.startsWith('hazardWavelengthsNm')) return 'hazardWavelengthsNm';
  const [part, place] = path.split('.');
  if (part === 'plateIds' || part === 'analysisPlateIds') {
    const field = part === 'plateIds' ? 'beam.preparation' : 'beam.analysis';
    return place === undefined ? field : `${field}.${Number(place)}`;
  }
  return detectorFields[path] ?? null;
}

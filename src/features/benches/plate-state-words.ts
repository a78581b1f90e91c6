import { blindNearDeg } from '../../../shared/optics/calibration';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import type { OpenQuestion } from '../../../shared/schemas/calibrations';
import { calibrationAge } from '../cabinet';

function openName(question: OpenQuestion, retardanceDeg: number): string {
  switch (question) {
    case 'axis':
      return 'fast or slow axis not settled';
    case 'branch':
      return 'retardance or 360° less it not settled';
    case 'blind':
      return `retardance hardly felt near ${blindNearDeg(retardanceDeg)}°`;
  }
}

/** How far a plate can be trusted, in a few words: "calibration 12 days over", "not seated". */
export function plateHealthWords(
  { health, calibration }: CabinetPlate,
  { calibrationDueDays, now }: { readonly calibrationDueDays: number; readonly now: Date },
): string {
  if (health === 'retired') return 'retired';
  if (health === 'not-seated') return 'not seated';
  if (calibration === null) return 'not calibrated in this seat';
  const { words } = calibrationAge(calibration.measuredAt, calibrationDueDays, now);
  const open = calibration.openQuestions.map((question) => openName(question, calibration.retardanceDeg));
  return [...open, `calibration ${words}`].join(', ');
}

/** Where it stands: "stands in signal arm", "in this beam already", or '' where it is free. */
export function plateWhere(
  { id, benches }: CabinetPlate,
  { benchId, inBeam }: { readonly benchId: string | null; readonly inBeam: readonly string[] },
): string {
  const others = benches.filter((bench) => bench.id !== benchId).map(({ name }) => name);
  if (others.length > 0) return `stands in ${others.join(' and ')}`;
  return inBeam.includes(id) ? 'in this beam already' : '';
}

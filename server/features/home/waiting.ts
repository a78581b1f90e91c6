import { calibrationDue, WARNED_DAYS } from '../../../shared/calibration-due';
import { can, type Member } from '../../../shared/permissions';
import type { Bench, CabinetPlate, Lab, RunSummary, WaitingItem } from '../../../shared/schemas';
import type { StaleVersion } from '../reliance';
import type { DraftAhead } from './drafts-ahead';
import type { WorstSetting } from './last-made';
import { staleItems } from './stale-items';
import type { Standing } from './next-settings';

/** A retardance measured this far from the bench's light is another retardance. */
const sameWavelengthNm = 0.5;

interface HomeFacts {
  readonly lab: Lab;
  readonly member: Member;
  /** In the beam of a bench in use. */
  readonly plates: readonly CabinetPlate[];
  /** Whether the cabinet holds any plate at all. */
  readonly hasPlates: boolean;
  /** In use. */
  readonly benches: readonly Bench[];
  readonly unfinished: readonly RunSummary[];
  /** Of each unfinished run, by its id. */
  readonly standings: ReadonlyMap<string, Standing>;
  readonly worst: readonly WorstSetting[];
  readonly drafts: readonly DraftAhead[];
  readonly protocolCount: number;
  readonly stale: readonly StaleVersion[];
  readonly now: Date;
}

/** What waits for this person, and for nobody who could do nothing about it: people before data before dates. */
export function waitingFor(facts: HomeFacts): WaitingItem[] {
  const { lab, member, hasPlates, benches, worst, drafts, protocolCount } = facts;
  const may = (action: Parameters<typeof can>[1]) => can(member, action, { labId: lab.id });
  const items: WaitingItem[] = [];
  if (may('runs.record')) items.push(...standing(facts));
  if (may('protocols.write'))
    items.push(...drafts.map((draft) => ({ kind: 'draft-ahead' as const, ...draft })));
  if (may('protocols.write') || may('runs.record')) items.push(...notWithin(worst));
  if (may('protocols.write')) items.push(...staleItems(facts.stale));
  if (may('calibrations.record'))
    items.push(...notReady(facts), ...open(facts), ...elsewhere(benches), ...due(facts));
  if (!hasPlates && may('cabinet.write')) items.push({ kind: 'no-plates' });
  if (benches.length === 0 && may('benches.write')) items.push({ kind: 'no-bench' });
  if (protocolCount === 0 && may('protocols.write')) items.push({ kind: 'no-protocol' });
  return items;
}

function standing({ unfinished, standings }: HomeFacts): WaitingItem[] {
  return unfinished.flatMap((run) => {
    const stands = standings.get(run.id);
    return stands === undefined ? [] : [{ kind: 'run-stands' as const, run, ...stands }];
  });
}

function notWithin(worst: readonly WorstSetting[]): WaitingItem[] {
  return worst
    .filter(({ made }) => made.dialledInfidelity > made.toleranceInfidelity)
    .map(({ run, made: { label, dialledInfidelity, toleranceInfidelity } }) => ({
      kind: 'dialled-not-within',
      run,
      label,
      dialledInfidelity,
      toleranceInfidelity,
    }));
}

function elsewhere(benches: readonly Bench[]): WaitingItem[] {
  return benches.flatMap((bench) =>
    bench.plates
      .filter(({ calibration }) => Math.abs(calibration.wavelengthNm - bench.wavelengthNm) > sameWavelengthNm)
      .map((plate) => ({
        kind: 'calibrated-elsewhere' as const,
        plateId: plate.id,
        plateName: plate.name,
        benchName: bench.name,
        calibratedAtNm: plate.calibration.wavelengthNm,
        benchNm: bench.wavelengthNm,
      })),
  );
}

const benchNamesOf = ({ benches }: CabinetPlate) => benches.map(({ name }) => name);

function notReady({ plates }: HomeFacts): WaitingItem[] {
  return plates
    .filter(({ calibration }) => calibration === null)
    .map((plate) => ({
      kind: 'plate-not-ready' as const,
      plateId: plate.id,
      plateName: plate.name,
      why: plate.seat === null ? ('not-seated' as const) : ('not-calibrated' as const),
      benchNames: benchNamesOf(plate),
    }));
}

function open({ plates }: HomeFacts): WaitingItem[] {
  return plates.flatMap((plate) =>
    plate.calibration === null || plate.calibration.openQuestions.length === 0
      ? []
      : [
          {
            kind: 'open-question' as const,
            plateId: plate.id,
            plateName: plate.name,
            questions: plate.calibration.openQuestions,
            benchNames: benchNamesOf(plate),
          },
        ],
  );
}

function due({ lab, plates, now }: HomeFacts): WaitingItem[] {
  return plates
    .flatMap((plate) =>
      plate.calibration === null
        ? []
        : [
            {
              kind: 'calibration-due' as const,
              plateId: plate.id,
              plateName: plate.name,
              measuredAt: plate.calibration.measuredAt,
              daysLeft: calibrationDue(plate.calibration.measuredAt, lab.calibrationDueDays, now).daysLeft,
              benchNames: benchNamesOf(plate),
            },
          ],
    )
    .filter(({ daysLeft }) => daysLeft <= WARNED_DAYS)
    .sort((a, b) => a.daysLeft - b.daysLeft);
}

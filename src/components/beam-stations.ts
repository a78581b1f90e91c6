/** The four stations on the beam: a quarter turn of the axis from planning to results. */
export const beamStations = [
  { key: 'plan', name: 'Plan', axisDeg: 90, goKey: 'p' },
  { key: 'review', name: 'Review', axisDeg: 60, goKey: 'r' },
  { key: 'bench', name: 'Bench', axisDeg: 30, goKey: 'b' },
  { key: 'results', name: 'Results', axisDeg: 0, goKey: 's' },
] as const;

/** What hangs on the side arm behind the splitter. */
export const sideStations = [
  { key: 'cabinet', name: 'Cabinet', shortName: 'Cabinet', goKey: 'c' },
  { key: 'lab', name: 'Lab', shortName: 'Lab', goKey: 'l' },
  { key: 'quick', name: 'Quick angles', shortName: 'Angles', goKey: 'q' },
] as const;

type BeamStationKey = (typeof beamStations)[number]['key'];
type SideStationKey = (typeof sideStations)[number]['key'];
export type StationKey = BeamStationKey | SideStationKey;

export interface StationTarget {
  readonly href: string;
  /** What waits there for this person. */
  readonly waiting?: number | undefined;
}

/** Where each station leads. One that is missing isn't drawn: a stranger has no cabinet. */
export type StationTargets = Partial<Readonly<Record<StationKey, StationTarget>>>;

import type { WaitingItem } from '../../shared/schemas/home';
import type { StationKey, StationTargets } from '../components/beam-stations';

/** Where each kind of waiting thing is dealt with; the first steps of a new lab are home's own business. */
const stationOf: Readonly<Record<WaitingItem['kind'], StationKey | null>> = {
  'run-stands': 'bench',
  'draft-ahead': 'plan',
  'dialled-not-within': 'results',
  'calibration-due': 'cabinet',
  'calibrated-elsewhere': 'cabinet',
  'plate-not-ready': 'cabinet',
  'open-question': 'cabinet',
  'stale-versions': 'cabinet',
  'no-plates': null,
  'no-bench': null,
  'no-protocol': null,
};

/** The stations of one lab, each with how much waits there for this person. */
export function labStations(labId: string, waiting: readonly WaitingItem[]): StationTargets {
  const target = (key: StationKey, page: string) => {
    const count = waiting.filter(({ kind }) => stationOf[kind] === key).length;
    return { href: `/labs/${labId}/${page}`, waiting: count === 0 ? undefined : count };
  };
  return {
    plan: target('plan', 'plan'),
    review: target('review', 'review'),
    bench: target('bench', 'bench'),
    results: target('results', 'results'),
    cabinet: target('cabinet', 'cabinet'),
    lab: target('lab', 'lab'),
    quick: { href: '/quick-angles' },
  };
}

/** The station that a page belongs to, by its address. */
export function stationAt(labId: string, pathname: string): StationKey | 'home' | null {
  const [page = ''] = pathname.slice(`/labs/${labId}/`.length).split('/');
  if (page === '') return 'home';
  const pages = ['plan', 'review', 'bench', 'results', 'cabinet', 'lab'] as const;
  return pages.find((name) => name === page) ?? null;
}

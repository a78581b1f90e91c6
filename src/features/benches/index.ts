export { elsewhereSentence, usedElsewhere } from './elsewhere-words';
export { LaserCaution, type LaserCautionProps } from './LaserCaution';
export { needsCaution } from './laser-caution-words';
export { benchLabel } from './bench-label';
export { benchesQuery, benchQuery } from './queries';
export { WaitsForPlates, waitsForPlates } from './WaitsForPlates';

export { elsewhereSentence, usedElsewhere } from './elsewhere-words';
export { LaserCaution, type LaserCautionProps } from './LaserCaution';
export { needsCaution } from './laser-caution-words';
export { benchesQuery, benchQuery } from './queries';

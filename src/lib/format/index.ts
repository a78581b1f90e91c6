export { formatAngle, formatChange, formatDial, formatTheta } from './angle';
export {
  daysBetween,
  formatDate,
  formatLongDate,
  formatMoment,
  formatShortDate,
  formatTime,
  formatTimeExact,
} from './date';
export { formatFidelity, formatInfidelity, infidelityAscii } from './fidelity';
export { parseTypedNumber, type TypedNumber } from './parse-number';
export { groupDigits, minusSign, missingSign, thinGap, toPlainAscii, withTrueMinus } from './signs';
export { fixed, formatUncertain, type ScientificParts, uncertainScientific } from './uncertain';

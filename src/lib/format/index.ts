export { formatAngle, formatChange, formatDial, formatTheta } from './angle';
export {
  daysBetween,
  formatDate,
  formatDays,
  formatLongDate,
  formatMoment,
  formatShortDate,
  formatTime,
  formatTimeExact,
  formatWeekday,
} from './date';
export { formatFidelity, formatInfidelity, infidelityAscii } from './fidelity';
export { commaSentence, parseTypedNumber, type TypedNumber } from './parse-number';
export { groupDigits, minusSign, missingSign, thinGap, toPlainAscii, withTrueMinus } from './signs';
export { fixed, formatUncertain, type ScientificParts, uncertainScientific } from './uncertain';

import { ANGLE_UNITS, type AngleUnit, POWER_UNITS, type PowerUnit } from './types';

/** A unit as a header writes it. */
export type WrittenUnit =
  | { readonly kind: 'angle'; readonly text: string; readonly unit: AngleUnit }
  | { readonly kind: 'power'; readonly text: string; readonly unit: PowerUnit }
  /** dB and the like: no factor makes a power of them. */
  | { readonly kind: 'logarithmic'; readonly text: string }
  | { readonly kind: 'unknown'; readonly text: string };

const ANGLE_WORDS: Readonly<Record<AngleUnit, readonly string[]>> = {
  deg: ['deg', 'degs', 'deg.', 'degree', 'degrees', '°'],
  rad: ['rad', 'rads', 'radian', 'radians'],
  mrad: ['mrad', 'mrads', 'milliradian', 'milliradians'],
  arcmin: ['arcmin', 'arcmins', 'arcminute', 'arcminutes', "'", '′'],
};

/** Words in any case; the units of `POWER_UNITS` themselves are taken as they are written, since mW is no MW. */
const POWER_WORDS: Readonly<Partial<Record<PowerUnit, readonly string[]>>> = {
  W: ['watt', 'watts'],
  mW: ['milliwatt', 'milliwatts'],
  uW: ['microwatt', 'microwatts'],
  nW: ['nanowatt', 'nanowatts'],
  V: ['volt', 'volts'],
  mV: ['millivolt', 'millivolts'],
  A: ['amp', 'amps', 'ampere', 'amperes'],
  counts: ['counts', 'count', 'cts'],
  'counts/s': ['counts/s', 'count/s', 'cts/s', 'counts/sec', 'counts per second', 'cps', 'hz'],
  arbitrary: [
    'a.u.',
    'a.u',
    'au',
    'arb',
    'arb.',
    'arb. u.',
    'arb.u.',
    'arb. units',
    'arb units',
    'arbitrary',
    'arbitrary units',
  ],
};

const LOGARITHMIC = ['db', 'dbm', 'dbu', 'dbv', 'dbw'];
/** Units of angles and steps that are known to be none of ours. */
const OTHER_UNITS = [
  'gon',
  'grad',
  'grads',
  'gradian',
  'gradians',
  'arcsec',
  '″',
  'turn',
  'turns',
  'rev',
  'steps',
  'mdeg',
  'urad',
];

const words = new Map<string, WrittenUnit>();
for (const unit of POWER_UNITS) words.set(unit, { kind: 'power', text: unit, unit });
for (const unit of ['mW', 'uW', 'nW', 'pW', 'mV', 'uV'] as const) {
  words.set(unit.toLowerCase(), { kind: 'power', text: unit, unit });
}
const anyCase = new Map<string, WrittenUnit>();
for (const unit of ANGLE_UNITS) {
  for (const word of ANGLE_WORDS[unit]) anyCase.set(word, { kind: 'angle', text: word, unit });
}
for (const unit of POWER_UNITS) {
  for (const word of POWER_WORDS[unit] ?? []) anyCase.set(word, { kind: 'power', text: word, unit });
}
for (const word of LOGARITHMIC) anyCase.set(word, { kind: 'logarithmic', text: word });
for (const word of OTHER_UNITS) anyCase.set(word, { kind: 'unknown', text: word });

/** The unit that a text is, as far as it is one that is known of; null otherwise. */
export function knownUnit(text: string): WrittenUnit | null {
  const written = text.trim();
  const plain = written.replace(/[µμ]/gu, 'u').replace(/[º˚]/gu, '°');
  const found = words.get(plain) ?? anyCase.get(plain.toLowerCase()) ?? null;
  return found === null ? null : { ...found, text: written };
}

/** As a page writes it. */
export function unitLabel(unit: AngleUnit | PowerUnit): string {
  return unit.startsWith('u') ? `µ${unit.slice(1)}` : unit;
}

/*
 * 180/π as the nearest double and what that lacks, so that the product is off by at most one unit in the last place
 * (both from 60 digits of π).
 */
const DEG_PER_RAD = 57.29577951308232;
const DEG_PER_RAD_REST = -1.9878495670576283e-15;
const DEG_PER_MRAD = 0.05729577951308232;
const DEG_PER_MRAD_REST = 3.1191763462180914e-18;
const ARCMIN_PER_DEG = 60;

/** An angle in degrees. Infinite where that is too large. */
export function inDegrees(value: number, unit: AngleUnit): number {
  switch (unit) {
    case 'deg':
      return value;
    case 'rad':
      return value * DEG_PER_RAD + value * DEG_PER_RAD_REST;
    case 'mrad':
      return value * DEG_PER_MRAD + value * DEG_PER_MRAD_REST;
    case 'arcmin':
      return value / ARCMIN_PER_DEG;
  }
}

interface Scale {
  /** Only powers of one quantity can be converted. */
  readonly quantity: string;
  /** Of its base unit. */
  readonly thousands: number;
}

const SCALES: Readonly<Record<PowerUnit, Scale>> = {
  W: { quantity: 'W', thousands: 0 },
  mW: { quantity: 'W', thousands: -1 },
  uW: { quantity: 'W', thousands: -2 },
  nW: { quantity: 'W', thousands: -3 },
  pW: { quantity: 'W', thousands: -4 },
  V: { quantity: 'V', thousands: 0 },
  mV: { quantity: 'V', thousands: -1 },
  uV: { quantity: 'V', thousands: -2 },
  A: { quantity: 'A', thousands: 0 },
  mA: { quantity: 'A', thousands: -1 },
  uA: { quantity: 'A', thousands: -2 },
  nA: { quantity: 'A', thousands: -3 },
  pA: { quantity: 'A', thousands: -4 },
  counts: { quantity: 'counts', thousands: 0 },
  'counts/s': { quantity: 'counts/s', thousands: 0 },
  '%': { quantity: '%', thousands: 0 },
  arbitrary: { quantity: 'arbitrary', thousands: 0 },
};

export function areCommensurable(one: PowerUnit, other: PowerUnit): boolean {
  return SCALES[one].quantity === SCALES[other].quantity;
}

/** Steps of a thousand, as literals: the power operator need not give the same bits everywhere. */
const THOUSANDS = [1, 1e3, 1e6, 1e9, 1e12];

/** A power in another unit of its quantity, correctly rounded since the factors are exact. Infinite where too large. */
export function inPowerUnit(value: number, from: PowerUnit, to: PowerUnit): number {
  const steps = SCALES[from].thousands - SCALES[to].thousands;
  const factor = THOUSANDS[Math.abs(steps)] ?? 1;
  return steps >= 0 ? value * factor : value / factor;
}

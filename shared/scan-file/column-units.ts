import { shown } from './fault-list';
import type { Header } from './header';
import { columnLabel } from './propose-columns';
import type { AngleUnit, ColumnChoice, ColumnMapping, PowerUnit } from './types';
import { areCommensurable, unitLabel, type WrittenUnit } from './units';

/** A mapping of which every unit is known. */
export interface UnitMapping extends ColumnMapping {
  readonly dial: Settled<AngleUnit>;
  readonly crossed: Settled<PowerUnit> | null;
  readonly parallel: Settled<PowerUnit> | null;
  readonly crossedSigma: Settled<PowerUnit> | null;
  readonly parallelSigma: Settled<PowerUnit> | null;
  /** The one to which all powers are converted. */
  readonly powerUnit: PowerUnit;
}

interface Settled<Unit> extends ColumnChoice<Unit> {
  readonly unit: Unit;
}

export interface UnitReading {
  /** Null where a question is open. */
  readonly mapping: UnitMapping | null;
  readonly questions: readonly string[];
  readonly notes: readonly string[];
  /** Whether nobody said the dial's unit. */
  readonly isDialAssumed: boolean;
}

/** Settles each column's unit: as chosen, else as the header writes it, else degrees, and for powers the other power's. */
export function settleUnits(header: Header, mapping: ColumnMapping): UnitReading {
  return new UnitSettler(header).settle(mapping);
}

class UnitSettler {
  private readonly questions: string[] = [];
  private readonly notes: string[] = [];
  private isDialAssumed = false;

  constructor(private readonly header: Header) {}

  settle(mapping: ColumnMapping): UnitReading {
    const dial = this.dial(mapping.dial);
    const written = [this.power(mapping.crossed), this.power(mapping.parallel)] as const;
    const crossed = this.orOther(mapping.crossed, written[0], written[1]);
    const parallel = this.orOther(mapping.parallel, written[1], written[0]);
    this.sameUnknown(mapping, written);
    this.incommensurable(crossed, parallel);
    const crossedSigma = this.sigma(mapping.crossedSigma, crossed);
    const parallelSigma = this.sigma(mapping.parallelSigma, parallel);
    const isSettled = this.questions.length === 0;
    const powerUnit = crossed?.unit ?? parallel?.unit ?? 'arbitrary';
    return {
      mapping: isSettled ? { dial, crossed, parallel, crossedSigma, parallelSigma, powerUnit } : null,
      questions: this.questions,
      notes: this.notes,
      isDialAssumed: this.isDialAssumed,
    };
  }

  private writtenUnit(column: number): WrittenUnit | null {
    return this.header.columns[column]?.unit ?? null;
  }

  private label(column: number): string {
    return columnLabel(this.header, column);
  }

  private dial({ column, unit }: ColumnChoice<AngleUnit>): Settled<AngleUnit> {
    const written = this.writtenUnit(column);
    if (unit !== null) return { column, unit };
    if (written?.kind === 'angle') return { column, unit: written.unit };
    if (written === null) {
      this.isDialAssumed = true;
      this.notes.push(`The dial, ${this.label(column)}, names no unit and is read in degrees.`);
    } else {
      this.questions.push(
        `In which unit is the dial, ${this.label(column)}? Its header says ${shown(written.text)}; degrees, radians, milliradians and arcminutes are known.`,
      );
    }
    return { column, unit: 'deg' };
  }

  /** Null where neither the choice nor the header names a unit of power. */
  private power(choice: ColumnChoice<PowerUnit> | null): PowerUnit | null {
    if (choice === null) return null;
    const { column, unit } = choice;
    const written = this.writtenUnit(column);
    if (unit !== null) return unit;
    if (written?.kind === 'power') return written.unit;
    if (written?.kind === 'logarithmic') {
      this.questions.push(
        `${capital(this.label(column))} is in ${shown(written.text)}, which is logarithmic. Write the powers in W or in counts, or name the unit if the header is wrong.`,
      );
    } else if (written?.kind === 'angle') {
      this.questions.push(
        `In which unit is ${this.label(column)}? Its header says ${shown(written.text)}, which is an angle’s.`,
      );
    }
    return null;
  }

  private orOther(
    choice: ColumnChoice<PowerUnit> | null,
    own: PowerUnit | null,
    other: PowerUnit | null,
  ): Settled<PowerUnit> | null {
    if (choice === null) return null;
    const { column } = choice;
    if (own === null && other !== null && this.writtenUnit(column) === null) {
      this.notes.push(
        `${capital(this.label(column))} names no unit and is read in ${unitLabel(other)}, as the other power is.`,
      );
    }
    return { column, unit: own ?? (this.writtenUnit(column) === null ? other : null) ?? 'arbitrary' };
  }

  /** One unit that nobody knows is as good as another, as long as all powers have it. */
  private sameUnknown(mapping: ColumnMapping, written: readonly [PowerUnit | null, PowerUnit | null]): void {
    const choices = [mapping.crossed, mapping.parallel];
    const units = choices.map((choice, at) =>
      choice === null || written[at] !== null ? null : this.writtenUnit(choice.column),
    );
    const unknown = units.filter((unit) => unit?.kind === 'unknown');
    const [one, other] = unknown;
    if (one === undefined) return;
    if (choices.includes(null)) {
      this.notes.push(`The power is in ${shown(one.text)}, a unit that is not known; it is kept as it is.`);
    } else if (one.text === other?.text) {
      this.notes.push(
        `Both powers are in ${shown(one.text)}, a unit that is not known; they are kept as they are.`,
      );
    } else {
      this.questions.push(
        `In which unit are the powers? The header says ${shown(one.text)}${other === undefined ? ' for one of them' : ` and ${shown(other.text)}`}, and both have to be in one.`,
      );
    }
  }

  private incommensurable(crossed: Settled<PowerUnit> | null, parallel: Settled<PowerUnit> | null): void {
    if (crossed === null || parallel === null || areCommensurable(crossed.unit, parallel.unit)) return;
    if (this.writtenUnit(crossed.column)?.kind === 'unknown' || this.questions.length > 0) return;
    this.questions.push(
      `In which unit are the powers? Crossed is in ${unitLabel(crossed.unit)} and parallel in ${unitLabel(parallel.unit)}, which can’t be compared.`,
    );
  }

  private sigma(
    choice: ColumnChoice<PowerUnit> | null,
    power: Settled<PowerUnit> | null,
  ): Settled<PowerUnit> | null {
    if (choice === null || power === null) return null;
    const { column } = choice;
    const written = this.writtenUnit(column);
    const own = choice.unit ?? (written?.kind === 'power' ? written.unit : null);
    const powerText = this.writtenUnit(power.column)?.text;
    if (own === null && (written === null || written.text === powerText)) {
      if (power.unit !== 'arbitrary' && written === null) {
        this.notes.push(
          `${capital(this.label(column))} names no unit and is read in ${unitLabel(power.unit)}, as its power is.`,
        );
      }
      return { column, unit: power.unit };
    }
    if (own === null || !areCommensurable(own, power.unit)) {
      this.questions.push(
        `In which unit is ${this.label(column)}? A σ is read in the unit of its power, ${unitLabel(power.unit)}, and not as a share of it.`,
      );
    }
    return { column, unit: own ?? power.unit };
  }
}

function capital(sentence: string): string {
  return `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}`;
}

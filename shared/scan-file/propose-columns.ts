import type { ColumnSubject } from './column-name';
import { shown } from './fault-list';
import type { Header } from './header';
import { evenestColumn, type Steps } from './steps';
import type { ColumnProposal, ScanRole } from './types';

export interface Proposed {
  readonly proposal: ColumnProposal;
  /** What a person has to say before the file can be read; none where the proposal is sound. */
  readonly questions: readonly string[];
}

type Columns = Record<ScanRole, number | null>;

const ROLE_WORDS: Readonly<Record<ScanRole, string>> = {
  dial: 'the dial’s reading',
  crossed: 'the power between crossed polarisers',
  parallel: 'the power between parallel polarisers',
  crossedSigma: 'the σ of the crossed power',
  parallelSigma: 'the σ of the parallel power',
};

/**
 * What the header's words say, and how the numbers go where it says nothing. Numbers can tell the dial; crossed and parallel are
 * never told from numbers. `steps` has the columns that hold numbers.
 */
export function proposeColumns(header: Header, steps: ReadonlyMap<number, Steps>): Proposed {
  return new Proposer(header, steps).proposed();
}

/** A column as a sentence names it. */
export function columnLabel(header: Header, column: number): string {
  const name = header.columns[column]?.name ?? null;
  return name === null ? `column ${column + 1}` : `column ${column + 1} (${shown(name)})`;
}

class Proposer {
  private readonly columns: Columns = {
    dial: null,
    crossed: null,
    parallel: null,
    crossedSigma: null,
    parallelSigma: null,
  };
  private readonly questions: string[] = [];
  private readonly reasons: string[] = [];
  private isGuess = false;

  constructor(
    private readonly header: Header,
    private readonly steps: ReadonlyMap<number, Steps>,
  ) {}

  proposed(): Proposed {
    for (const role of ['crossed', 'parallel'] as const) this.named(role, role, false);
    const arePortsOpen = this.powers().length === 0 && this.questions.length === 0;
    this.named('dial', 'dial', false);
    this.named('crossedSigma', 'crossed', true);
    this.named('parallelSigma', 'parallel', true);
    this.bareSigmas();
    this.nameReason();
    this.dialByNumbers();
    if (arePortsOpen) this.askPorts();
    this.askWhereHeaderAndNumbersDiffer();
    const isUnclear = this.questions.length > 0;
    const confidence = isUnclear ? 'unclear' : this.isGuess ? 'likely' : 'sure';
    const reason = this.reasons.join(' ');
    return { proposal: { columns: this.columns, confidence, reason }, questions: this.questions };
  }

  private label(column: number): string {
    return columnLabel(this.header, column);
  }

  private subjects(isWanted: (subject: ColumnSubject) => boolean): number[] {
    return this.header.columns.flatMap(({ subject }, column) => (isWanted(subject) ? [column] : []));
  }

  /** The one column whose name says so. */
  private named(role: ScanRole, quantity: ColumnSubject['quantity'], isSigma: boolean): void {
    const found = this.subjects((subject) => subject.quantity === quantity && subject.isSigma === isSigma);
    const [only] = found;
    if (only !== undefined && found.length === 1) {
      this.columns[role] = only;
    } else if (found.length > 1) {
      const labels = found.map((column) => this.label(column)).join(' and ');
      this.questions.push(`Which column is ${ROLE_WORDS[role]}? By their names, ${labels} could be.`);
    }
  }

  /** No name tells a port. Where one column is left beside the dial, only its port is asked for. */
  private askPorts(): void {
    const taken = Object.values(this.columns);
    const left = [...this.steps.keys()].filter(
      (column) => !taken.includes(column) && this.header.columns[column]?.subject.isSigma !== true,
    );
    const [only] = left;
    const asked =
      this.columns.dial !== null && only !== undefined && left.length === 1
        ? [`Is ${this.label(only)} the power between crossed or between parallel polarisers?`]
        : [ROLE_WORDS.crossed, ROLE_WORDS.parallel].map((words) => `Which column is ${words}?`);
    this.questions.unshift(
      ...asked.map((question) => `${question} No name says so, and numbers alone can’t.`),
    );
  }

  /** "err" alone belongs to the power on its left, where each power has one there. */
  private bareSigmas(): void {
    const bare = this.subjects(({ quantity, isSigma }) => isSigma && quantity === null);
    if (bare.length === 0) return;
    const { crossed, parallel, crossedSigma, parallelSigma } = this.columns;
    const behind = this.powers().map((column) => column + 1);
    const isFree = crossedSigma === null && parallelSigma === null && bare.length === behind.length;
    if (isFree && behind.every((column) => bare.includes(column))) {
      this.columns.crossedSigma = crossed === null ? null : crossed + 1;
      this.columns.parallelSigma = parallel === null ? null : parallel + 1;
      this.isGuess = true;
      this.reasons.push(
        bare.length === 1
          ? 'The column of σ belongs to the power on its left.'
          : 'Each column of σ belongs to the power on its left.',
      );
      return;
    }
    const labels = bare.map((column) => this.label(column)).join(' and ');
    this.questions.push(`Whose σ is ${labels}? Say which power it belongs to, or leave it out.`);
  }

  private nameReason(): void {
    const told = Object.values(this.columns).filter((column) => column !== null).length;
    if (told > 0) this.reasons.unshift('The header’s words name the columns.');
    else if (this.header.line === null) this.reasons.unshift('The file has no header.');
    else this.reasons.unshift('The header’s words name none of the columns.');
  }

  private dialByNumbers(): void {
    if (this.columns.dial !== null || this.subjects(isDial).length > 1) return;
    const taken = Object.values(this.columns);
    const free = new Map([...this.steps].filter(([column]) => !taken.includes(column)));
    const evenest = evenestColumn(free);
    if (evenest === null || this.isRivalled(free.get(evenest) ?? 'none')) {
      this.questions.push(
        `Which column is ${ROLE_WORDS.dial}? No column goes up or down more evenly than all others.`,
      );
      return;
    }
    this.columns.dial = evenest;
    this.isGuess = true;
    const how = free.get(evenest) === 'one way' ? 'goes one way only' : 'goes in even steps';
    this.reasons.push(`The dial is ${this.label(evenest)}, since it alone ${how}.`);
  }

  /** Whether a column that is called a power goes as evenly as the one that would be the dial. */
  private isRivalled(dialSteps: Steps): boolean {
    return this.powers().some((column) => this.steps.get(column) === dialSteps);
  }

  private askWhereHeaderAndNumbersDiffer(): void {
    const { dial } = this.columns;
    if (dial === null || this.steps.get(dial) !== 'none') return;
    const even = this.powers().find((column) => isEven(this.steps.get(column)));
    if (even === undefined) return;
    this.questions.push(
      `Is the header in the columns’ order? It calls ${this.label(dial)} the dial, but ${this.label(even)} goes in even steps, as a dial does.`,
    );
  }

  private powers(): number[] {
    return [this.columns.crossed, this.columns.parallel].filter((column) => column !== null);
  }
}

function isDial({ quantity, isSigma }: ColumnSubject): boolean {
  return quantity === 'dial' && !isSigma;
}

function isEven(steps: Steps | undefined): boolean {
  return steps === 'even' || steps === 'nearly even';
}

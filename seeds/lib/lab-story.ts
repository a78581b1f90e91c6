import { freeze } from '../../shared/protocol/freeze';
import type {
  CalibrationInput,
  CreateBench,
  CreatePlate,
  DraftContent,
  Lab,
  RecordReading,
  Version,
} from '../../shared/schemas';
import { type AuditEntry, recordEvent } from '../../server/audit/record-event';
import type { Transaction } from '../../server/db/database';
import { newId } from '../../server/db/new-id';
import { findBench, insertBench } from '../../server/features/benches';
import {
  addPlate,
  findPlate,
  insertCalibration,
  seatPlate,
  type StoredPlate,
  takeOutPlate,
} from '../../server/features/cabinet';
import {
  findProtocol,
  findVersion,
  insertProtocol,
  insertVersion,
  updateDraft,
} from '../../server/features/protocols';
import {
  changeState,
  findRun,
  readingEntry,
  recordReading,
  startedEntry,
  startRun,
  type StateChange,
  stateEntry,
} from '../../server/features/runs';
import type { Person } from './people';
import { recordScan, type ToldScan, uploadScan } from './told-scan';

interface Step {
  readonly at: Date;
  readonly tell: () => Promise<void>;
}

/**
 * What happened in a lab, told in any order and then done in the order of its times, by the server's own stores: a
 * version freezes the calibrations of its day, and the record's chain is in the order of time.
 */
export class LabStory {
  readonly #steps: Step[] = [];
  constructor(
    readonly transaction: Transaction,
    readonly lab: Lab,
  ) {}

  async tell(): Promise<void> {
    for (;;) {
      this.#steps.sort((a, b) => a.at.getTime() - b.at.getTime());
      const next = this.#steps.shift();
      if (next === undefined) return;
      // A run that starts says then what is recorded of it later.
      await next.tell();
    }
  }

  plate(at: Date, by: Person, plate: CreatePlate): string {
    const id = newId(at);
    this.#happened(at, by, async () => {
      await addPlate(this.transaction, this.#place(at, by), plate, id);
      return { kind: 'plate.added', subjectId: id, details: { plate } };
    });
    return id;
  }

  calibration(at: Date, by: Person, plateId: string, calibration: CalibrationInput): void {
    this.#happened(at, by, async () => {
      const { seat } = await this.#plate(plateId);
      if (seat === null) throw new Error('a plate is calibrated in a seat');
      const id = await insertCalibration(this.transaction, this.#place(at, by), seat.id, calibration);
      return { kind: 'plate.calibrated', subjectId: plateId, details: { calibrationId: id, calibration } };
    });
  }

  /** Uploads a scan between polarisers and, in the same moment, records what the fit says. */
  scan(at: Date, by: Person, plateId: string, scan: ToldScan): void {
    this.#happened(at, by, async () => {
      const place = this.#place(at, by);
      const uploaded = await uploadScan(this.transaction, place, scan);
      this.#happened(at, by, async () => {
        const plate = await this.#plate(plateId);
        return recordScan(this.transaction, { ...place, lab: this.lab }, plate, uploaded.subjectId, scan);
      });
      return uploaded;
    });
  }

  /** Takes a plate out and puts it back into the same mount. */
  reseat(at: Date, by: Person, plateId: string, why: string): void {
    this.#happened(at, by, async () => {
      const plate = await this.#plate(plateId);
      if (plate.seat === null) throw new Error('a plate is seated before it is seated anew');
      const { mountId } = plate.seat;
      const details = await seatPlate(this.transaction, this.#place(at, by), plate, {
        mountId,
        why,
        at: null,
      });
      return { kind: 'plate.seated', subjectId: plateId, details: { ...details } };
    });
  }

  takeOut(at: Date, by: Person, plateId: string, why: string): void {
    this.#happened(at, by, async () => {
      const plate = await this.#plate(plateId);
      const details = await takeOutPlate(this.transaction, this.#place(at, by), plate, { why, at: null });
      return { kind: 'plate.taken-out', subjectId: plateId, details: { ...details } };
    });
  }

  bench(at: Date, by: Person, bench: CreateBench): string {
    const id = newId(at);
    this.#happened(at, by, async () => {
      await insertBench(this.transaction, { labId: this.lab.id, now: at }, bench, id);
      return { kind: 'bench.added', subjectId: id, details: { bench } };
    });
    return id;
  }

  protocol(at: Date, by: Person, content: DraftContent): string {
    const id = newId(at);
    this.#happened(at, by, async () => {
      await insertProtocol(this.transaction, { labId: this.lab.id, user: by, now: at }, id, content);
      return { kind: 'protocol.begun', subjectId: id, details: { name: content.name } };
    });
    return id;
  }

  draft(at: Date, by: Person, protocolId: string, content: DraftContent): void {
    this.#happened(at, by, async () => {
      const stored = await this.#protocol(protocolId);
      const saving = { labId: this.lab.id, user: by, now: at };
      const draft = await updateDraft(this.transaction, saving, stored, content);
      return {
        kind: 'draft.saved',
        subjectId: protocolId,
        details: { revision: draft.revision, targetCount: content.targets.length },
      };
    });
  }

  version(at: Date, by: Person, protocolId: string, message: string): void {
    this.#happened(at, by, async () => {
      const { draft, latestVersion } = await this.#protocol(protocolId);
      const bench = await findBench(this.transaction, { labId: this.lab.id, benchId: draft.content.benchId });
      if (bench === null) throw new Error('a version is saved after its bench is there');
      const frozen = freeze({
        lab: this.lab,
        protocolId,
        draft: draft.content,
        bench,
        number: (latestVersion?.number ?? 0) + 1,
        parentHash: latestVersion?.contentHash ?? null,
        message,
        savedAt: at,
        savedBy: by,
      });
      if (!frozen.ok) throw new Error(frozen.faults.map((fault) => fault.message).join(' '));
      const summary = await insertVersion(this.transaction, newId(at), frozen, draft.revision);
      return {
        kind: 'version.saved',
        subjectId: summary.id,
        details: { protocolId, number: summary.number, contentHash: summary.contentHash, message },
      };
    });
  }

  /** A run of a version, a setting each few minutes; `readings` says what was done at each. */
  run(
    at: Date,
    by: Person,
    run: {
      readonly protocolId: string;
      readonly number: number;
      readonly readings: (version: Version) => readonly RecordReading[];
      readonly end: { readonly kind: 'pause'; readonly note: string } | { readonly kind: 'finish' };
    },
  ): void {
    this.#happened(at, by, async () => {
      const key = { labId: this.lab.id, protocolId: run.protocolId, number: run.number };
      const version = await findVersion(this.transaction, key);
      if (version === null) throw new Error('a run follows its version');
      const dials = version.content.bench.plates.map(() => null);
      const runId = await startRun(this.transaction, this.#doing(at, by), version, {
        startDialsDeg: dials,
        staleAcknowledged: true,
      });
      const { summary } = await this.#run(runId);
      let time = at.getTime();
      for (const reading of run.readings(version)) {
        time += 4 * 60_000 + 7_000;
        this.#reading(new Date(time), by, runId, version, reading);
      }
      const note = run.end.kind === 'pause' ? run.end.note : '';
      this.#stateChange(new Date(time + 60_000), by, runId, { kind: run.end.kind, note });
      return startedEntry(summary, version);
    });
  }

  #reading(at: Date, by: Person, runId: string, version: Version, reading: RecordReading): void {
    this.#happened(at, by, async () => {
      const run = await this.#run(runId);
      const id = await recordReading(this.transaction, this.#doing(at, by), run, version, reading);
      return readingEntry(runId, id, reading);
    });
  }

  #stateChange(at: Date, by: Person, runId: string, change: StateChange): void {
    this.#happened(at, by, async () => {
      await changeState(this.transaction, this.#doing(at, by), await this.#run(runId), change);
      return stateEntry(runId, change);
    });
  }

  #happened(at: Date, by: Person, work: () => Promise<AuditEntry>): void {
    this.#steps.push({
      at,
      tell: async () => {
        const entry = await work();
        await recordEvent(
          this.transaction,
          { labId: this.lab.id, actor: { id: by.id, name: by.name }, at },
          entry,
        );
      },
    });
  }

  #place(at: Date, by: Person) {
    return { labId: this.lab.id, userId: by.id, now: at };
  }

  #doing(at: Date, by: Person) {
    return { labId: this.lab.id, userId: by.id, at };
  }

  async #plate(plateId: string): Promise<StoredPlate> {
    const plate = await findPlate(this.transaction, { labId: this.lab.id, plateId });
    if (plate === null) throw new Error('a plate is added before anything happens to it');
    return plate;
  }

  async #protocol(protocolId: string) {
    const stored = await findProtocol(this.transaction, { labId: this.lab.id, protocolId });
    if (stored === null) throw new Error('a draft is saved after its protocol is begun');
    return stored;
  }

  async #run(runId: string) {
    const run = await findRun(this.transaction, { labId: this.lab.id, runId });
    if (run === null) throw new Error('a run that was just started is not there');
    return run;
  }
}

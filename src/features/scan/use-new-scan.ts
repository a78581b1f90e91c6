import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useMemo, useRef, useState } from 'react';
import { asMeasuredBefore } from '../../../shared/scan-calibration';
import type { ColumnMapping, Understood } from '../../../shared/scan-file';
import type { CabinetPlate, PlateDetail } from '../../../shared/schemas/cabinet';
import type { LeftOut, RecordScan } from '../../../shared/schemas/scans';
import { sayDone } from '../../components/live-region-store';
import { typedFromNumber, useIdempotencyKey } from '../../lib/forms';
import { useLab } from '../labs';
import type { ScanReply, ScanRequest } from './answer-scan';
import { type ColumnRoles, mappingOfRoles, NO_ROLES, rolesOfProposal } from './column-roles';
import { recordScan, rememberedColumnsQuery, scanBenchQuery } from './queries';
import { useStoredScan } from './recorded-scan';
import {
  emptyScanForm,
  readLight,
  readSurroundings,
  type ScanField,
  type ScanFormValues,
} from './scan-form-values';
import { useScanAnswer } from './use-scan-answer';
import { useScanFile } from './use-scan-file';
import { recordWaitsFor, settledBy } from './record-rules';

type SeatedPlate = CabinetPlate & { readonly seat: NonNullable<CabinetPlate['seat']> };

export interface NewScanProps {
  readonly plate: SeatedPlate;
  readonly detail: PlateDetail;
  readonly lightKind: ScanFormValues['lightKind'];
  readonly now: Date;
  readonly onRecorded: () => void;
}

/** What of a file could be understood, if anything. */
export function understoodOf(reply: ScanReply | null): Understood | null {
  switch (reply?.kind) {
    case 'table':
    case 'asks':
      return reply;
    case 'refused':
    case 'fitted':
      return reply.table;
    case 'faults':
      return reply.understood;
    case 'failed':
    case undefined:
      return null;
  }
}

function tableOf(reply: ScanReply | null) {
  if (reply?.kind === 'table') return reply;
  return reply?.kind === 'refused' || reply?.kind === 'fitted' ? reply.table : null;
}

/** The columns as they were used, with the units left to the header. */
function usedRoles({ dial, crossed, parallel, crossedSigma, parallelSigma }: ColumnMapping): ColumnRoles {
  const asWritten = (choice: { readonly column: number } | null) =>
    choice === null ? null : { column: choice.column, unit: null };
  return {
    dial: asWritten(dial),
    crossed: asWritten(crossed),
    parallel: asWritten(parallel),
    crossedSigma: asWritten(crossedSigma),
    parallelSigma: asWritten(parallelSigma),
  };
}

/** Everything of a scan that is not recorded yet: the file, its columns, the light, the lines left out, and the fit. */
export function useNewScan({ plate, detail, lightKind, now, onRecorded }: NewScanProps) {
  const { lab } = useLab();
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  const scanFile = useScanFile(lab.id);
  const [typed, setTyped] = useState<Partial<ScanFormValues>>({});
  const [chosenRoles, setChosenRoles] = useState<ColumnRoles | null>(null);
  const [usesMemory, setUsesMemory] = useState(true);
  const [leftOut, setLeftOut] = useState<readonly LeftOut[]>([]);
  const [isTried, setIsTried] = useState(false);
  const [signature, setSignature] = useState<string | null>(null);
  const isDone = useRef(false);

  const benchId = plate.benches[0]?.id ?? null;
  const bench = useQuery({ ...scanBenchQuery(lab.id, benchId ?? ''), enabled: benchId !== null });
  const stated = bench.data?.polariserExtinction ?? null;
  const earlier = detail.calibrations.filter(
    ({ seatId, scan }) => seatId === plate.seat.id && scan?.light === 'linear',
  );
  const values: ScanFormValues = {
    ...emptyScanForm({
      lightKind,
      wavelengthNm: plate.calibration?.wavelengthNm ?? bench.data?.wavelengthNm ?? plate.designWavelengthNm,
      temperatureC: null,
      beforeId: earlier[0]?.id ?? '',
      now,
    }),
    ...(stated === null ? {} : { extinction: typedFromNumber(stated), extinctionSigma: '0' }),
    ...typed,
  };
  const light = readLight(values, lab.convention);
  const around = readSurroundings(values, plate.seat.seatedAt, new Date());
  const faults = { ...light.faults, ...around.faults };
  const before = useStoredScan(
    lab.id,
    plate.id,
    plate,
    light.light?.kind === 'known' ? light.light.beforeId : null,
  );
  const isBeforePending =
    light.light?.kind === 'known' && light.light.beforeId !== null && before.stored === null;

  const remembered = useQuery({
    ...rememberedColumnsQuery(lab.id, signature ?? ''),
    enabled: signature !== null,
  });
  const memory = usesMemory && signature !== null ? (remembered.data?.columns ?? null) : null;
  const chosen = chosenRoles === null ? null : mappingOfRoles(chosenRoles);
  const columnProblem = chosen?.ok === false ? chosen.problem : null;
  const columns = chosen?.ok === true ? chosen.mapping : memory;
  const isMemoryAsked = signature !== null && !remembered.isPending;
  const canFit =
    light.light !== null &&
    around.forFit !== null &&
    !isBeforePending &&
    isMemoryAsked &&
    columnProblem === null;

  const file = scanFile.chosen;
  const [measuredBefore = null] = detail.calibrations;
  const isKnownLight = values.lightKind === 'known';
  const question = JSON.stringify([
    isKnownLight,
    columns,
    canFit ? [light.light, light.input, around.forFit] : null,
    leftOut,
  ]);
  const request = useMemo(
    (): ScanRequest | null => {
      if (file === null) return null;
      const { forFit } = around;
      const read = light.light;
      if (!canFit || forFit === null || read === null)
        return { bytes: file.bytes, columns, isKnownLight, fit: null, earlier: null };
      const fitLight =
        read.kind === 'linear'
          ? read
          : {
              kind: 'known' as const,
              input: light.input ?? ([0, 0, 0] as const),
              analyserDeg: read.analyserDeg,
              extinction: read.extinction,
              before: null,
            };
      return {
        bytes: file.bytes,
        columns,
        isKnownLight,
        earlier: read.kind === 'known' ? before.stored : null,
        fit: {
          light: fitLight,
          leftOutLines: leftOut.map(({ line }) => line),
          plate: {
            kind: plate.kind,
            designWavelengthNm: plate.designWavelengthNm,
            construction: plate.construction,
            material: plate.material,
            order: plate.order,
          },
          direction: plate.seat.mount.direction,
          ...forFit,
          measuredBefore: measuredBefore === null ? null : asMeasuredBefore(measuredBefore),
        },
      };
    },
    // What is asked is in `question`; the objects that it is written from are new at every stroke.
    // eslint-disable-next-line react-hooks/exhaustive-deps -- see above
    [file, question, before.stored, plate.id, plate.seat.mount.direction, measuredBefore?.id],
  );
  const work = useScanAnswer(request);
  const reply = work.answered?.bytes === file?.bytes ? work.reply : null;
  const understood = understoodOf(reply);
  if (understood !== null && understood.signature !== signature) setSignature(understood.signature);
  const table = tableOf(reply);
  const scan = reply?.kind === 'fitted' ? reply : null;
  const roles =
    chosenRoles ??
    memory ??
    (table === null
      ? understood === null
        ? NO_ROLES
        : rolesOfProposal(understood.proposal)
      : usedRoles(table.mapping));

  const recording = useMutation({
    mutationFn: async (body: Omit<RecordScan, 'fileId'>) => {
      if (file === null) throw new Error('a scan is recorded from a file');
      const fileId = await scanFile.store(file.file);
      const whole = { ...body, fileId };
      return recordScan(lab.id, plate.id, whole, keyFor(whole));
    },
    onSuccess: async () => {
      isDone.current = true;
      sayDone(`The scan of ${plate.name} is recorded.`);
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
      onRecorded();
    },
    // The plate may have moved meanwhile: what stands here is then asked for anew, and nothing typed is lost.
    onError: () => queryClient.invalidateQueries({ queryKey: ['labs', lab.id, 'plates', 'one', plate.id] }),
  });
  const settlesId = scan === null ? null : settledBy(scan, plate.calibration);
  const waitsFor = recordWaitsFor({
    hasFile: file !== null,
    columnProblem,
    reply,
    isWorking: work.state === 'working',
    isRecording: recording.isPending,
    hasFaults: Object.keys(faults).length > 0 || light.expressionProblem !== null,
    hasRetardanceBefore: measuredBefore !== null,
  });
  const record = () => {
    setIsTried(true);
    if (scan === null || light.light === null || around.surroundings === null) return;
    recording.mutate({
      columns: scan.table.mapping,
      light: light.light,
      leftOut: [...leftOut],
      ...around.surroundings,
      settlesId,
      shown: {
        offsetDeg: scan.values.offsetDeg,
        retardanceDeg: scan.values.retardance === null ? null : scan.values.retardance.deg,
      },
    });
  };

  return {
    scanFile,
    file,
    values,
    light,
    bench: typed.extinction === undefined && stated !== null ? (bench.data ?? null) : null,
    earlier,
    before,
    isBeforePending,
    /** Said of what was typed, and of everything once recording was tried. */
    faultOf: (field: ScanField) => (isTried || typed[field] !== undefined ? faults[field] : undefined),
    change: (change: Partial<ScanFormValues>) => setTyped({ ...typed, ...change }),
    take: async (taken: File) => {
      if (!(await scanFile.choose(taken))) return;
      setChosenRoles(null);
      setUsesMemory(true);
      setLeftOut([]);
      setSignature(null);
      recording.reset();
    },
    understood,
    table,
    roles,
    isFromMemory: memory !== null && chosenRoles === null,
    forget: () => setUsesMemory(false),
    chooseRoles: setChosenRoles,
    columnProblem,
    reply,
    scan,
    work,
    leftOut,
    setLeftOut,
    settlesId,
    waitsFor,
    recording,
    record,
    isDone,
  };
}

export type NewScanState = ReturnType<typeof useNewScan>;

import type { ReactNode } from 'react';
import { type Convention, ellipseOf, parseState, toDegrees } from '../../../shared/optics';
import { type Bench, benchParts } from '../../../shared/schemas/benches';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { EllipseGlyph } from '../../components/EllipseGlyph';
import { Quantity, ScientificText } from '../../components/NumberText';
import { Polariser } from '../../components/Polariser';
import { TextLink } from '../../components/TextLink';
import { useLab } from '../labs';
import { PlateSign } from './PlateSign';
import { PlateSummary } from './PlateSummary';
import { plateHealthWords } from './plate-state-words';
import './benches.css';

/** More ellipticity than this no polariser alone makes. */
const linearWithinDeg = 0.01;

/** A bench's whole beam on one line: source, polariser, the plates of both parts, and what counts at its end. */
export function BeamLineOfBench(props: {
  readonly bench: Bench;
  /** Undefined until they have come: the names stand already. */
  readonly plates: readonly CabinetPlate[] | undefined;
  readonly now: Date;
}) {
  const { bench, plates, now } = props;
  const { lab } = useLab();
  const analyses = bench.order.some(({ part }) => part === 'analysis');
  const { passed, rejected } = bench.detectors;
  const hasEnd = analyses || passed !== null || rejected !== null;
  return (
    <ol aria-label={`The beam of ${bench.name}, as light goes`} className="beam-run">
      <OnLine room="little" zone={<span aria-hidden="true" className="beam-run-source" />}>
        <p className="font-strong">
          <span className="sr-only">source, </span>
          <Quantity text={String(bench.wavelengthNm)} unit="nm" />
        </p>
      </OnLine>
      <OnLine zone={<InputSign expression={bench.inputExpression} convention={lab.convention} />}>
        <p className="font-strong">polariser</p>
        <p className="text-s text-ink-2">
          σ of its angle {bench.polariserSigmaDeg}°
          <span className="block">
            {bench.polariserExtinction === null ? (
              'extinction not stated'
            ) : (
              <Extinction value={bench.polariserExtinction} />
            )}
          </span>
        </p>
      </OnLine>
      {benchParts.flatMap((part) =>
        bench.order
          .filter((place) => place.part === part)
          .map(({ plateId, name }, index) => (
            <OnLine
              key={plateId}
              zone={<PlateSign plate={plates?.find(({ id }) => id === plateId)} radius={26} now={now} />}
              part={index === 0 ? part : null}
            >
              <PlateWords
                name={name}
                plateId={plateId}
                plate={plates?.find(({ id }) => id === plateId)}
                now={now}
              />
            </OnLine>
          )),
      )}
      {hasEnd && (
        <OnLine
          room="much"
          zone={
            <>
              <Polariser radius={22} axisDeg={0} />
              <span aria-hidden="true" className="beam-run-stop" />
            </>
          }
        >
          <p className="font-strong">analysing polariser</p>
          <DetectorWords detectors={bench.detectors} />
        </OnLine>
      )}
    </ol>
  );
}

function OnLine(props: {
  readonly zone: ReactNode;
  readonly part?: string | null;
  /** How much room its words take. */
  readonly room?: 'little' | 'much';
  readonly children: ReactNode;
}) {
  const { zone, part = null, room, children } = props;
  return (
    <li className="bench-on-line" data-room={room}>
      <div className="bench-zone">{zone}</div>
      {part !== null && <p className="bench-part-name">{part}</p>}
      {children}
    </li>
  );
}

function Extinction({ value }: { readonly value: number }) {
  const [mantissa = '', exponent] = value.toExponential().split('e');
  return (
    <>
      extinction <ScientificText mantissa={mantissa} exponent={Number(exponent)} mono={false} />
    </>
  );
}

/** The polariser at its axis, or the ellipse of an input that no polariser alone makes. */
function InputSign(props: { readonly expression: string; readonly convention: Convention }) {
  const reading = parseState(props.expression, props.convention);
  if (!reading.ok) return null;
  const { azimuthRad, ellipticityRad } = ellipseOf(reading.stokes);
  const chiDeg = toDegrees(ellipticityRad);
  const psiDeg = toDegrees(azimuthRad);
  if (Math.abs(chiDeg) <= linearWithinDeg) return <Polariser radius={22} axisDeg={psiDeg} />;
  return (
    <EllipseGlyph
      radius={18}
      psiDeg={psiDeg}
      chiDeg={chiDeg}
      sense={chiDeg > 0 ? 'counter-clockwise' : 'clockwise'}
      framed
    />
  );
}

function PlateWords(props: {
  readonly name: string;
  readonly plateId: string;
  readonly plate: CabinetPlate | undefined;
  readonly now: Date;
}) {
  const { name, plateId, plate, now } = props;
  const { lab } = useLab();
  const { calibrationDueDays } = lab;
  const isBad = plate !== undefined && plate.health !== 'calibrated' && plate.health !== 'due';
  return (
    <>
      <TextLink to={`/labs/${lab.id}/cabinet/${plateId}`} className="font-strong">
        {name}
      </TextLink>
      {plate !== undefined && (
        <>
          <p className="text-s text-ink-2 mt-1">
            <PlateSummary plate={plate} />
          </p>
          <p className={isBad ? 'text-s text-fault font-strong' : 'text-s text-ink-2'}>
            {plateHealthWords(plate, { calibrationDueDays, now })}
          </p>
        </>
      )}
    </>
  );
}

function DetectorWords({ detectors }: Pick<Bench, 'detectors'>) {
  const { passed, rejected, efficiencyRatio } = detectors;
  if (passed === null && rejected === null) return <p className="text-ink-2">no detector named</p>;
  return (
    <>
      {[['passed', passed] as const, ['rejected', rejected] as const].map(
        ([port, detector]) =>
          detector !== null && (
            <p key={port}>
              <span className="text-s text-ink-2">{port}</span> <strong>{detector.name}</strong>
              <span className="text-s text-ink-2">
                , dark <Quantity text={String(detector.darkRatePerS)} unit="per second" />
              </span>
            </p>
          ),
      )}
      {passed !== null && rejected !== null && (
        <p className="text-s text-ink-2">
          efficiency, rejected over passed {efficiencyRatio ?? 'not measured'}
        </p>
      )}
    </>
  );
}

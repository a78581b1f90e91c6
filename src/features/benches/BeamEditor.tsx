import { useState } from 'react';
import { type BenchPart, benchParts, maxBenchPlates } from '../../../shared/schemas/benches';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { classNames } from '../../components/class-names';
import { UndoSentence } from '../../components/UndoSentence';
import { useLab } from '../labs';
import { type ConflictBench, plateConflicts } from './bench-conflicts';
import { BeamPlateRow } from './BeamPlateRow';
import { type Beam, isFull, spotOf } from './beam-order';
import { PlateFinder } from './PlateFinder';
import { useBeamDrag } from './use-beam-drag';
import { useBeamMoves } from './use-beam-moves';
import './benches.css';

/** What the server or the schema has against a part of the beam, or against one of its places. */
export type BeamFaults = Readonly<Record<BenchPart, PartFaults>>;
interface PartFaults {
  readonly part: string | undefined;
  readonly places: readonly (string | undefined)[];
}

const heads: Readonly<Record<BenchPart, { readonly title: string; readonly words: string }>> = {
  preparation: { title: 'Preparation', words: 'behind the polariser, one to six plates' },
  analysis: { title: 'Analysis', words: 'before the analysing polariser, none to six plates' },
};

/** The beam as one line from its source down the page: what prepares the light, then what analyses it. */
export function BeamEditor(props: {
  readonly beam: Beam;
  readonly onBeam: (beam: Beam) => void;
  /** The plates that this page knows, by id. */
  readonly plates: ReadonlyMap<string, CabinetPlate>;
  readonly nameOf: (plateId: string) => string | undefined;
  readonly onFound: (plate: CabinetPlate) => void;
  readonly bench: ConflictBench;
  readonly faults: BeamFaults;
  readonly now: Date;
}) {
  const { beam, onBeam, plates, nameOf, onFound, bench, faults, now } = props;
  const { lab } = useLab();
  const [list, setList] = useState<HTMLDivElement | null>(null);
  const places = benchParts.flatMap((part) => beam[part]);
  const inBeam = places.map(({ plateId }) => plateId);
  const nameOfPlace = (key: string): string => {
    const place = places.find((other) => other.key === key);
    return (place === undefined ? undefined : nameOf(place.plateId)) ?? 'The plate';
  };
  const moves = useBeamMoves({ beam, onBeam, list, nameOf: nameOfPlace });
  const { dragged, grip, wasDrag } = useBeamDrag(list, moves.drop);
  return (
    <div ref={setList} className="beam-edit">
      <p className="beam-edit-end">
        <span className="beam-edit-source" aria-hidden="true" />
        light, through the polariser
      </p>
      {benchParts.map((part) => (
        <section key={part} data-part={part} aria-labelledby={`${part}-head`} className="bench-part">
          <div className="bench-part-head">
            <h3 id={`${part}-head`} className="font-section">
              {heads[part].title}
            </h3>
            <span className="text-s text-ink-2">{heads[part].words}</span>
          </div>
          <ol aria-label={`Plates of ${part}, in beam order`}>
            {beam[part].map(({ key, plateId }, index) => {
              const plate = plates.get(plateId);
              const times = inBeam.filter((id) => id === plateId).length;
              const isDropHere =
                dragged?.to?.part === part && dragged.to.index === index && dragged.key !== key;
              return (
                <BeamPlateRow
                  key={key}
                  placeKey={key}
                  name={nameOf(plateId) ?? 'A plate that is not known here'}
                  plate={plate}
                  conflicts={
                    plate === undefined
                      ? []
                      : plateConflicts(plate, { part, times }, bench, {
                          calibrationDueDays: lab.calibrationDueDays,
                          now,
                        })
                  }
                  fault={faults[part].places[index]}
                  now={now}
                  moves={moves}
                  onGrip={grip(key)}
                  wasDrag={wasDrag}
                  draggedByPx={dragged?.key === key ? dragged.byPx : null}
                  isDropBefore={isDropHere}
                />
              );
            })}
          </ol>
          <div
            className={classNames(
              'bench-part-foot',
              dragged?.to?.part === part &&
                dragged.to.index === beam[part].length &&
                spotOf(beam, dragged.key)?.index !== beam[part].length - 1 &&
                'bench-drop-before',
            )}
          >
            {faults[part].part !== undefined && (
              <p role="alert" className="text-fault font-strong">
                {faults[part].part}
              </p>
            )}
            {isFull(beam, part) ? (
              <p className="text-s text-ink-2">{maxBenchPlates} plates are the most that this part has.</p>
            ) : (
              <PlateFinder
                label={`add a plate to ${part}`}
                benchId={bench.id}
                inBeam={inBeam}
                now={now}
                onChoose={(plate) => {
                  onFound(plate);
                  moves.add(part, plate.id, plate.name);
                }}
              />
            )}
          </div>
        </section>
      ))}
      <p className="beam-edit-end">
        <span className="beam-edit-stop" aria-hidden="true" />
        analysing polariser and detectors
      </p>
      {moves.taken !== null && (
        <UndoSentence
          sentence={`${moves.taken.name} taken out of ${moves.taken.spot.part}.`}
          onUndo={moves.undo}
          onGone={moves.forget}
        />
      )}
    </div>
  );
}

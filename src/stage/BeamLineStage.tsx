import { type ReactNode, useRef } from 'react';
import { Button } from '../components/Button';
import { classNames } from '../components/class-names';
import { edgeFade } from '../components/edge-fade';
import { useBoxWidth } from '../sphere/use-box-width';
import { OutputLight } from './OutputLight';
import { PlateOnBeam } from './PlateOnBeam';
import { Source, StagePolariser } from './SourceAndPolariser';
import { type StageData, turnedByHand } from './stage-data';
import { arrangeStage } from './stage-layout';
import { StateBetween } from './StateBetween';
import './stage.css';

interface Props {
  readonly stage: StageData;
  /** Turns a plate by hand, to see what it does; without it the rings only show. */
  readonly onDial?: ((plateIndex: number, dialDeg: number) => void) | undefined;
  readonly onBackToSolution?: (() => void) | undefined;
  /** Someone who stands on the source side sees every ring mirrored; each says so. */
  readonly viewedFrom?: 'receiver' | 'source';
  /** The readout: what this setting is expected to make. */
  readonly children?: ReactNode;
}

/** Where nothing tells the width. */
const DESK_WIDTH = 1360;

/** The bench in a line, as the hand meets it: source, polariser, plates in beam order with the light between them, output. */
export function BeamLineStage({ stage, onDial, onBackToSolution, viewedFrom = 'receiver', children }: Props) {
  const box = useRef<HTMLDivElement>(null);
  const width = useBoxWidth(box, DESK_WIDTH);
  if (width === null) return <div ref={box} className="stage-waits" />;
  const { sizes, readoutBeside, scrolls } = arrangeStage(width, stage.plates.length, children !== undefined);
  const turned = turnedByHand(stage.plates);
  return (
    <div ref={box} className={classNames('stage', !readoutBeside && 'stage-stacked')}>
      <div
        className={classNames(
          'stage-line',
          scrolls && 'stage-line-scrolls',
          scrolls && onDial !== undefined && 'stage-line-turnable',
        )}
        // What scrolls has to take the keys too.
        {...(scrolls
          ? { ref: edgeFade, tabIndex: 0, role: 'region', 'aria-label': 'Beam line, scrolls along the beam' }
          : {})}
      >
        <ol
          className="stage-items"
          aria-label="Beam line from the source to the output"
          style={{ minWidth: sizes.leastWidth }}
        >
          <li className="stage-beam" aria-hidden="true" style={{ top: sizes.zoneHeight / 2 - 1.3 }} />
          <Source wavelengthNm={stage.wavelengthNm} zoneHeight={sizes.zoneHeight} />
          <StagePolariser
            {...stage.polariser}
            input={stage.before[0]}
            convention={stage.convention}
            sizes={sizes}
            viewedFrom={viewedFrom}
          />
          {stage.plates.map((plate, index) => {
            const state = stage.before[index];
            return (
              <PlateOnBeam
                key={plate.id}
                plate={plate}
                sizes={sizes}
                viewedFrom={viewedFrom}
                onDial={onDial === undefined ? undefined : (dialDeg) => onDial(index, dialDeg)}
                before={
                  state === undefined ? null : (
                    <StateBetween
                      state={state}
                      convention={stage.convention}
                      sizes={sizes}
                      viewedFrom={viewedFrom}
                    />
                  )
                }
              />
            );
          })}
          <OutputLight
            output={stage.output}
            convention={stage.convention}
            sizes={sizes}
            viewedFrom={viewedFrom}
          />
        </ol>
        {turned.length > 0 && onBackToSolution !== undefined && (
          <p className="stage-by-hand">
            <span>{turned.map(({ name }) => name).join(' and ')} turned by hand</span>
            <Button onClick={onBackToSolution}>Back to the solution</Button>
          </p>
        )}
      </div>
      {children !== undefined && <div className="stage-readout">{children}</div>}
    </div>
  );
}

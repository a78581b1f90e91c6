import { useState } from 'react';
import { AgeRing, ageWords } from '../../components/AgeRing';
import { Button } from '../../components/Button';
import {
  DataCell,
  DataRow,
  DataTable,
  HeadCell,
  LitEdge,
  RowHead,
  TableHead,
} from '../../components/DataTable';
import { Dialog } from '../../components/Dialog';
import { EllipseGlyph } from '../../components/EllipseGlyph';
import { ErrorNote } from '../../components/ErrorNote';
import { FidelityChip } from '../../components/FidelityChip';
import { Formula } from '../../components/Formula';
import { Lamp, LampInkSwitch } from '../../components/Lamp';
import { Mark } from '../../components/Mark';
import { NumberText } from '../../components/NumberText';
import { Polariser } from '../../components/Polariser';
import { ProgressRule, type RuleDivision } from '../../components/ProgressRule';
import { RingDialControl } from '../../components/RingDialControl';
import { SaveState } from '../../components/SaveState';
import { ScaleWindow } from '../../components/ScaleWindow';
import { Scientific } from '../../components/Scientific';
import { SectionHead } from '../../components/SectionHead';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { SelectField } from '../../components/SelectField';
import { HeldSign, PausedRunSign, ScanSign, UnsettledSign } from '../../components/SmallSigns';
import { TextArea } from '../../components/TextArea';
import { TextField } from '../../components/TextField';
import { UndoSentence } from '../../components/UndoSentence';
import type { ViewedFrom } from '../../components/dial-words';
import { formatDial, formatFidelity, formatTheta } from '../../lib/format';

const quarter = { offsetDeg: 301.73, direction: -1, resolutionDeg: 0.1, rangeDeg: null } as const;

const divisions: readonly RuleDivision[] = ['t0', 't1', 't2', 't3', 'd+', 'c+'].flatMap((group, index) =>
  Array.from({ length: 4 }, (_, part): RuleDivision => {
    const at = index * 4 + part;
    return { group, state: at === 4 ? 'skipped' : at < 8 ? 'done' : at === 8 ? 'current' : 'ahead' };
  }),
);

const rows = [
  {
    label: 't1',
    latex: String.raw`\mathrm{bloch}(109.47^\circ, 0^\circ)`,
    source: 'bloch(109.47deg, 0deg)',
    dialDeg: 156.7,
    thetaDeg: 145.03,
    infidelity: { value: 2.2e-5, low: 4e-6, high: 7e-5 },
  },
  {
    label: 't2',
    latex: String.raw`\mathrm{bloch}(109.47^\circ, 120^\circ)`,
    source: 'bloch(109.47deg, 120deg)',
    dialDeg: 187,
    thetaDeg: 114.73,
    infidelity: { value: 2.5e-5, low: 5e-6, high: 7.8e-5 },
  },
  {
    label: 'c+',
    latex: String.raw`\tfrac{1}{\sqrt2}(|H\rangle + i|V\rangle)`,
    source: '(H + i V)/sqrt(2)',
    dialDeg: 256.7,
    thetaDeg: 45.03,
    infidelity: { value: 4.3e-4, low: 3e-4, high: 6e-4 },
  },
] as const;

/** What the picture of the parts has no room for. */
export function MoreParts() {
  const [readingDeg, setReading] = useState(187);
  const [viewedFrom, setViewedFrom] = useState<ViewedFrom>('receiver');
  const [asked, setAsked] = useState(false);
  const [undo, setUndo] = useState(false);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-10 px-5 pt-4 pb-20 sm:px-10 desk:grid-cols-[repeat(2,minmax(0,1fr))]">
      <section aria-labelledby="control" className="space-y-4">
        <SectionHead id="control" note="drag, arrow keys, buttons or the number">
          A ring that can be turned
        </SectionHead>
        <div className="flex flex-wrap items-end gap-8">
          <RingDialControl
            name="Q-B"
            radius={92}
            kind="quarter"
            scale={quarter}
            readingDeg={readingDeg}
            viewedFrom={viewedFrom}
            onChange={setReading}
          />
          <SegmentedChoice
            label="I stand on"
            value={viewedFrom}
            onChange={setViewedFrom}
            segments={[
              { value: 'receiver', label: 'the receiver’s side' },
              { value: 'source', label: 'the source side' },
            ]}
          />
        </div>
        <div data-theme="dark-room" className="space-y-4 p-6">
          <p className="text-ink-2">
            when Q-B says {formatDial(readingDeg)}, the scale under its index looks like this
          </p>
          <ScaleWindow readingDeg={readingDeg} scale={quarter} viewedFrom={viewedFrom} />
          <ProgressRule divisions={divisions} label="setting 9 of 24" />
          <div className="flex flex-wrap items-center gap-6">
            <Lamp />
            <LampInkSwitch />
          </div>
        </div>
      </section>
      <section aria-labelledby="tray" className="space-y-4">
        <SectionHead
          id="tray"
          note="the outer arc is the time since calibration; a full quarter turn means due"
        >
          Plates, states, signs
        </SectionHead>
        <ul className="m-0 flex list-none flex-wrap gap-6 p-0 pt-2">
          {[
            { name: 'H-1', age: 38, axis: 12, lit: false, unsettled: false },
            { name: 'Q-B', age: 0, axis: 15, lit: true, unsettled: true },
            { name: 'Q-D', age: 102, axis: 30, lit: false, unsettled: false },
            { name: 'Q-E', age: 16, axis: 81, lit: false, unsettled: true },
            { name: 'Q-F', age: 0, axis: null, lit: false, unsettled: false },
          ].map(({ name, age, axis, lit, unsettled }) => (
            <li key={name} className="flex flex-col items-center text-xs text-ink-2">
              <AgeRing fastAxisDeg={axis} ageDays={age} dueDays={90} lit={lit} unsettled={unsettled} />
              <b className="text-body text-ink">{name}</b>
              {axis === null ? 'not seated' : ageWords(age, 90)}
            </li>
          ))}
        </ul>
        <div className="flex flex-wrap items-center gap-6">
          <Polariser axisDeg={0} label="polariser at H" />
          <EllipseGlyph radius={26} psiDeg={-37.8} chiDeg={0} sense="none" label="linear at −37.8°" />
          <EllipseGlyph
            radius={55}
            psiDeg={-62.64}
            chiDeg={27.39}
            sense="counter-clockwise"
            lit
            framed
            label="t2, counter-clockwise"
          />
          <EllipseGlyph radius={24} psiDeg={0} chiDeg={45} sense="clockwise" label="circular, clockwise" />
          <PausedRunSign />
          <UnsettledSign />
          <ScanSign />
          <Mark size={36} />
          <Mark size={18} />
        </div>
        <p className="flex flex-wrap items-baseline gap-6">
          <NumberText text={formatFidelity(0.999975)} className="text-readout" />
          <Scientific value={2.5e-5} />
          <SaveState saving={{ kind: 'typed' }} />
          <SaveState saving={{ kind: 'kept', waiting: 3 }} one="reading" many="readings" />
          <SaveState saving={{ kind: 'saved', at: new Date(2026, 5, 16, 10, 42, 7) }} />
        </p>
        <ErrorNote announce={false} title="Line 14 of the scan has no power">
          Put a number after the semicolon, or drop the line.
        </ErrorNote>
      </section>
      <section aria-labelledby="table" className="space-y-4">
        <SectionHead id="table" note="arrow keys by cell, Home and End by row">
          A table
        </SectionHead>
        <DataTable caption="Three targets with the dial of Q-B">
          <TableHead>
            <tr>
              <HeadCell className="pl-3!">label</HeadCell>
              <HeadCell>target, after the plates</HeadCell>
              <HeadCell numeric>Q-B dial</HeadCell>
              <HeadCell numeric>θ</HeadCell>
              <HeadCell>expected 1 − F</HeadCell>
            </tr>
          </TableHead>
          <tbody>
            {rows.map(({ label, latex, source, dialDeg, thetaDeg, infidelity }, index) => (
              <DataRow key={label} selected={index === 1}>
                <RowHead className="pl-3!">
                  {index === 1 && <LitEdge />}
                  {label}
                </RowHead>
                <DataCell>
                  <Formula latex={latex} source={source} />
                </DataCell>
                <DataCell numeric className="text-dial">
                  {index === 2 && <HeldSign className="mr-2 align-middle" />}
                  {formatDial(dialDeg)}
                </DataCell>
                <DataCell numeric className="text-s text-ink-2">
                  {formatTheta(thetaDeg)}
                </DataCell>
                <DataCell>
                  <span className="flex items-center gap-2">
                    <FidelityChip kind="predicted" infidelity={infidelity} tolerance={1e-3} width={96} />
                    <Scientific value={infidelity.value} className="text-s" />
                  </span>
                </DataCell>
              </DataRow>
            ))}
          </tbody>
        </DataTable>
      </section>
      <section aria-labelledby="more-forms" className="space-y-4">
        <SectionHead id="more-forms">More of forms</SectionHead>
        <div className="grid gap-4 sm:grid-cols-2">
          <TextField label="name" help="as it is engraved on the mount" defaultValue="Q-B" />
          <SelectField
            label="kind"
            placeholder="choose one"
            defaultValue="quarter"
            options={[
              { value: 'half', label: 'half-wave' },
              { value: 'quarter', label: 'quarter-wave' },
            ]}
          />
          <TextArea label="comment" defaultValue="t3 may stay." className="sm:col-span-2" />
        </div>
        <div className="flex flex-wrap gap-4">
          <Button
            kind="danger"
            onClick={() => {
              setAsked(true);
            }}
          >
            Withdraw version 12
          </Button>
          <Button
            onClick={() => {
              setUndo(true);
            }}
          >
            Take row 4 out
          </Button>
        </div>
        <Dialog
          open={asked}
          question="Withdraw version 12?"
          onClose={() => {
            setAsked(false);
          }}
          actions={
            <>
              <Button
                kind="danger"
                onClick={() => {
                  setAsked(false);
                }}
              >
                Withdraw version 12
              </Button>
              <Button
                onClick={() => {
                  setAsked(false);
                }}
              >
                Keep it
              </Button>
            </>
          }
        >
          <p>No run can start on it any more. Two runs were taken with it; they keep their results.</p>
        </Dialog>
        {undo && (
          <UndoSentence
            sentence="Row 4 taken out."
            onUndo={() => {
              setUndo(false);
            }}
            onGone={() => {
              setUndo(false);
            }}
          />
        )}
      </section>
    </div>
  );
}

import type { Convention } from '../../shared/optics/convention';
import type { Stokes } from '../../shared/optics/stokes';
import { EllipseGlyph } from '../components/EllipseGlyph';
import { Quantity } from '../components/NumberText';
import { Polariser } from '../components/Polariser';
import { formatAngle, formatUncertain } from '../lib/format';
import { glyphOf } from './glyph';
import type { StageSizes } from './stage-layout';

export function Source({
  wavelengthNm,
  zoneHeight,
}: {
  readonly wavelengthNm: number;
  readonly zoneHeight: number;
}) {
  return (
    <li className="stage-item stage-source">
      <span className="stage-zone" style={{ height: zoneHeight }} aria-hidden="true">
        <span className="stage-source-tick" />
      </span>
      <strong className="stage-name">
        <span className="sr-only">source, </span>
        <Quantity text={String(wavelengthNm)} unit="nm" />
      </strong>
    </li>
  );
}

const ON_AXIS_WITHIN_DEG = 0.05;

/** `H` for 0°, `V` for 90°, the angle otherwise. */
function axisName(axisDeg: number): string {
  const letters: readonly (readonly [number, string])[] = [
    [0, 'H'],
    [90, 'V'],
    [45, 'D'],
    [-45, 'A'],
  ];
  const near = letters.find(([at]) => Math.abs(((axisDeg - at + 90 + 360) % 180) - 90) < ON_AXIS_WITHIN_DEG);
  return near === undefined ? formatAngle(axisDeg) : near[1];
}

/** A polariser makes linear light; an input with more ellipticity than this is made by something else. */
const LINEAR_INPUT_WITHIN_DEG = 0.01;

interface PolariserProps {
  readonly axisDeg: number;
  readonly axisSigmaDeg: number | null;
  /** The light that goes into the first plate, canonical; undefined where nobody says. */
  readonly input: Stokes | undefined;
  readonly convention: Convention;
  readonly sizes: StageSizes;
  readonly viewedFrom: 'receiver' | 'source';
}

/** What the plates are fed with: a polariser at its axis, or the ellipse of an input that no polariser alone makes. */
export function StagePolariser(props: PolariserProps) {
  const { axisDeg, axisSigmaDeg, input, convention, sizes, viewedFrom } = props;
  const glyph = input === undefined ? null : glyphOf(input, convention);
  if (glyph !== null && Math.abs(glyph.chiDeg) > LINEAR_INPUT_WITHIN_DEG) {
    return (
      <li className="stage-item">
        <span className="stage-zone" style={{ height: sizes.zoneHeight }}>
          <EllipseGlyph
            radius={sizes.polariserRadius / 1.3}
            psiDeg={glyph.psiDeg}
            chiDeg={glyph.chiDeg}
            sense={glyph.sense}
            viewedFrom={viewedFrom}
            framed
          />
        </span>
        <strong className="stage-name">input</strong>
        <span className="stage-second font-mono">
          <span className="stage-symbol">ψ</span> {formatAngle(glyph.psiDeg)}
        </span>{' '}
        <span className="stage-second font-mono">
          <span className="stage-symbol">χ</span> {formatAngle(glyph.shownChiDeg)}
        </span>
      </li>
    );
  }
  return (
    <li className="stage-item">
      <span className="stage-zone" style={{ height: sizes.zoneHeight }}>
        <Polariser radius={sizes.polariserRadius} axisDeg={axisDeg} viewedFrom={viewedFrom} />
      </span>
      <strong className="stage-name">polariser at {axisName(axisDeg)}</strong>
      <span className="stage-second font-mono">{formatUncertain(axisDeg, axisSigmaDeg, 2)}°</span>
    </li>
  );
}

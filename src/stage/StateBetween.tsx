import type { Convention } from '../../shared/optics/convention';
import type { Stokes } from '../../shared/optics/stokes';
import { EllipseGlyph } from '../components/EllipseGlyph';
import { stateInWords } from '../sphere/path-words';
import { glyphOf } from './glyph';
import type { StageSizes } from './stage-layout';

interface Props {
  readonly state: Stokes;
  readonly convention: Convention;
  readonly sizes: StageSizes;
  readonly viewedFrom: 'receiver' | 'source';
}

/** The light between two plates: a small bar or ellipse in a gap of the beam, with its azimuth or its letter. */
export function StateBetween({ state, convention, sizes, viewedFrom }: Props) {
  const glyph = glyphOf(state, convention);
  const half = sizes.glyphRadius + 6;
  return (
    <span className="stage-between" style={{ height: sizes.zoneHeight }}>
      <span className="stage-gap" style={{ width: 2 * half, height: 2 * half }} aria-hidden="true">
        <svg width={2 * half} height={2 * half} viewBox={`${-half} ${-half} ${2 * half} ${2 * half}`}>
          <path
            d={`M${-half} 0H${half}M0 ${-half}V${half}`}
            className="stroke-rule"
            strokeWidth="0.9"
            strokeDasharray="1 3"
          />
        </svg>
        <EllipseGlyph
          radius={sizes.glyphRadius}
          psiDeg={glyph.psiDeg}
          chiDeg={glyph.chiDeg}
          sense={glyph.sense}
          viewedFrom={viewedFrom}
        />
      </span>
      <span className="stage-state" style={{ top: sizes.zoneHeight / 2 + half + 4 }}>
        <span className="sr-only">then light, {stateInWords(state, convention)}</span>
        <span aria-hidden="true" className={glyph.letter === null ? 'font-mono' : 'stage-letter'}>
          {glyph.letter ?? glyph.azimuth}
        </span>
      </span>
    </span>
  );
}

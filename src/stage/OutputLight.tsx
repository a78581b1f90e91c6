import type { Convention } from '../../shared/optics/convention';
import type { Stokes } from '../../shared/optics/stokes';
import { EllipseGlyph } from '../components/EllipseGlyph';
import { formatAngle } from '../lib/format';
import { glyphOf } from './glyph';
import type { StageSizes } from './stage-layout';

interface Props {
  readonly output: { readonly label: string; readonly state: Stokes };
  readonly convention: Convention;
  readonly sizes: StageSizes;
  readonly viewedFrom: 'receiver' | 'source';
}

/** The light that comes out with the dials as they stand. */
export function OutputLight({ output, convention, sizes, viewedFrom }: Props) {
  const glyph = glyphOf(output.state, convention);
  return (
    <li className="stage-item stage-item-output">
      <span className="stage-zone" style={{ height: sizes.zoneHeight }}>
        <EllipseGlyph
          radius={sizes.outputRadius}
          psiDeg={glyph.psiDeg}
          chiDeg={glyph.chiDeg}
          sense={glyph.sense}
          viewedFrom={viewedFrom}
          lit
          framed
        />
      </span>
      <span className="stage-name">
        <strong>{output.label}</strong>{' '}
        <span className="stage-quiet">
          as dialled, to the {viewedFrom === 'receiver' ? 'receiver' : 'source'}
        </span>
      </span>
      <span className="stage-theta font-mono">
        <span className="stage-symbol">ψ</span> {formatAngle(glyph.psiDeg, 2)}{' '}
        <span className="stage-symbol">χ</span> {formatAngle(glyph.shownChiDeg, 2)}
      </span>
    </li>
  );
}

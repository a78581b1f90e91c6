import {
  blochToStokes,
  ellipseOf,
  type Quaternion,
  rotate,
  type Stokes,
  stokesToBloch,
  toDegrees,
} from '../../../shared/optics';
import { EllipseGlyph } from '../../components/EllipseGlyph';
import { SectionHead } from '../../components/SectionHead';
import { formatAngle } from '../../lib/format';
import { asPlate, lightInWords, senseOf } from './light-words';

const goingIn: readonly { readonly id: string; readonly stokes: Stokes }[] = [
  { id: 'level', stokes: [1, 0, 0] },
  { id: 'diagonal', stokes: [0, 1, 0] },
  { id: 'circular', stokes: [0, 0, 1] },
];

/** "It passes a line at 22.5° first; what is opposite falls behind by 180.0°." */
export function plateSentence(unitary: Quaternion): string {
  const plate = asPlate(unitary);
  if (plate === null) return 'It leaves every light as it is.';
  return `It passes ${lightInWords(plate.fast)} first; the light opposite to that falls behind by ${formatAngle(plate.retardanceDeg)}.`;
}

function Light({ stokes }: { readonly stokes: Stokes }) {
  const { azimuthRad, ellipticityRad } = ellipseOf(stokes);
  return (
    <span className="flex items-center gap-3">
      <EllipseGlyph
        radius={26}
        psiDeg={toDegrees(azimuthRad)}
        chiDeg={toDegrees(ellipticityRad)}
        sense={senseOf(stokes)}
        framed
        className="shrink-0"
      />
      <span>{lightInWords(stokes)}</span>
    </span>
  );
}

/** A unitary before anyone writes it down: as the one plate that does the same, and what it makes of three lights. */
export function UnitaryFigure({ unitary }: { readonly unitary: Quaternion }) {
  return (
    <section aria-labelledby="the-unitary">
      <SectionHead id="the-unitary" note="what everyone sees alike">
        What it does to light
      </SectionHead>
      <p className="mt-2 text-[1.125rem] leading-6">
        <b>{plateSentence(unitary)}</b> No convention has a say in that.
      </p>
      <table className="mt-4 w-full max-w-4xl text-left">
        <thead className="text-s text-ink-2">
          <tr className="border-ink border-b-[1.5px]">
            <th scope="col" className="font-words py-1.5 pr-6">
              goes in
            </th>
            <th scope="col" className="font-words py-1.5">
              comes out
            </th>
          </tr>
        </thead>
        <tbody>
          {goingIn.map(({ id, stokes }) => (
            <tr key={id} className="border-hair border-b">
              <th scope="row" className="font-words w-1/2 py-1.5 pr-6">
                <Light stokes={stokes} />
              </th>
              <td className="py-1.5">
                <Light stokes={blochToStokes(rotate(unitary, stokesToBloch(stokes)))} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

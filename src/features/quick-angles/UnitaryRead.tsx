import { type Convention, radians, toDegrees } from '../../../shared/optics';
import type { RowReading } from '../../../shared/protocol/solve-row';
import { Formula } from '../../components/Formula';
import { TextLink } from '../../components/TextLink';
import { fixed, formatAngle, withTrueMinus } from '../../lib/format';
import { conventionsHref } from '../conventions';
import { turnOf } from './turn-of';

/** A written unitary as it was read: its formula, its turn of the sphere, and what was divided away. */
export function UnitaryRead(props: {
  readonly reading: Extract<RowReading, { kind: 'unitary' }>;
  /** As it was typed, in `convention`. */
  readonly source: string;
  readonly convention: Convention;
}) {
  const { reading, source, convention } = props;
  const turn = turnOf(reading.quaternion, convention);
  return (
    <div>
      <p className="text-body sm:text-[1.125rem]">
        <Formula latex={reading.latex} source={reading.canonical} />
      </p>
      <p className="text-ink-2 mt-1">
        {turn === null
          ? 'It leaves every state as it is'
          : `A right-handed turn of the sphere by ${formatAngle(toDegrees(radians(turn.angleRad)))} about (S1, S2, S3) = (${turn.axis
              .map((part) => withTrueMinus(fixed(part, 3)))
              .join(', ')})`}
        {reading.normalised && `. Written ${Number(reading.scale.toPrecision(4))} times that`}.{' '}
        <TextLink to={conventionsHref('unitary', source, convention)}>In each convention</TextLink>
      </p>
    </div>
  );
}

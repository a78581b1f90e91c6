import type { VersionContent } from '../../../shared/schemas/versions';
import { formatDate, formatUncertain } from '../../lib/format';

const kindWords = { half: 'half-wave', quarter: 'quarter-wave', other: 'other' } as const;

/** The plates in beam order with the calibrations that the angles were worked out from. */
export function FrozenPlates({ content }: { readonly content: VersionContent }) {
  return (
    <div
      className="relative overflow-x-auto"
      tabIndex={0}
      role="region"
      aria-label="Plates, scrolls sideways"
    >
      <table className="w-full border-collapse">
        <thead>
          <tr className="border-b border-ink text-left text-s text-ink-2">
            <th scope="col" className="h-8 font-words">
              plate
            </th>
            <th scope="col" className="font-words">
              kind
            </th>
            <th scope="col" className="text-right font-words">
              retardance, ° (σ)
            </th>
            <th scope="col" className="text-right font-words">
              used here, °
            </th>
            <th scope="col" className="text-right font-words">
              zero, ° (σ)
            </th>
            <th scope="col" className="pl-8 font-words">
              numbers rise
            </th>
            <th scope="col" className="text-right font-words">
              dial step, °
            </th>
            <th scope="col" className="pl-8 font-words">
              calibrated
            </th>
          </tr>
        </thead>
        <tbody>
          {content.bench.plates.map(({ id, name, kind, mount, calibration, used }) => (
            <tr key={id} className="h-[39px] border-b border-hair">
              <th scope="row" className="text-left font-strong">
                {name}
              </th>
              <td>
                {kindWords[kind]}, in mount {mount.name}
              </td>
              <td className="text-right font-mono">
                {formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg)}
              </td>
              <td className="text-right font-mono">
                {used.retardanceDeg.toFixed(2)}
                {used.source === 'no-model' && (
                  <span className="block font-words text-s text-fault">measured elsewhere, no model</span>
                )}
              </td>
              <td className="text-right font-mono">
                {formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg)}
              </td>
              <td className="pl-8">{mount.direction === 1 ? 'counter-clockwise' : 'clockwise'}</td>
              <td className="text-right font-mono">{mount.resolutionDeg}</td>
              <td className="pl-8">
                {formatDate(new Date(calibration.measuredAt))} at {calibration.wavelengthNm} nm,{' '}
                {calibration.method}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

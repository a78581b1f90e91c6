import type { Stokes } from '../../../shared/optics';
import { formatAngle } from '../../lib/format';
import { fieldMoments, timeWord } from './field-times';
import { writtenReal } from './written-numbers';

const head = 'border-b-[1.5px] border-ink px-2 pb-1.5 font-words text-ink-2';
const cell = 'px-2 py-[0.1875rem] text-right';

/** The eight moments in numbers, for who would rather read them than trace the drawing. */
export function FieldTable({ stokes }: { readonly stokes: Stokes }) {
  return (
    <table className="text-s w-full">
      <caption className="sr-only">
        The field at z = 0 in eighths of a period, in units of the whole amplitude
      </caption>
      <thead>
        <tr>
          <th scope="col" className={`${head} pl-0! text-left`}>
            at
          </th>
          <th scope="col" className={`${head} text-right`}>
            E<sub>H</sub>
          </th>
          <th scope="col" className={`${head} text-right`}>
            E<sub>V</sub>
          </th>
          <th scope="col" className={`${head} pr-0! text-right`}>
            points to
          </th>
        </tr>
      </thead>
      <tbody>
        {fieldMoments(stokes).map(({ eighths, h, v, towardsDeg }) => (
          <tr key={eighths} className="border-hair border-b">
            <th scope="row" className="text-left font-words whitespace-nowrap">
              <span className="text-ink-3 mr-3 font-mono" aria-hidden="true">
                {eighths}
              </span>
              {timeWord(eighths)}
            </th>
            <td className={`${cell} font-mono`}>{writtenReal(h)}</td>
            <td className={`${cell} font-mono`}>{writtenReal(v)}</td>
            <td className={`${cell} pr-0! font-mono`}>{formatAngle(towardsDeg)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

import type { Convention, JonesVector } from '../../../shared/optics';
import { TextLink } from '../../components/TextLink';
import { conventionsHref } from '../conventions';
import { lightRows } from './same-light';

interface SameLightProps {
  readonly jones: JonesVector;
  /** As it was typed, in `own`. */
  readonly source: string;
  readonly own: Convention;
}

/** One state as every published convention writes it, so that two people can find out why their circular light disagrees. */
export function SameLight({ jones, source, own }: SameLightProps) {
  return (
    <section aria-labelledby="same-light" className="border-ink border-t-[1.5px] pt-4">
      <h2 id="same-light" className="text-section mb-2">
        The same light, in each convention
      </h2>
      <table className="w-full text-left">
        <thead className="sr-only">
          <tr>
            <th scope="col">convention</th>
            <th scope="col">Jones vector, H then V</th>
            <th scope="col">hand and S3</th>
          </tr>
        </thead>
        <tbody>
          {lightRows(jones, own).map((row) => (
            <tr
              key={row.id}
              className={
                row.id === 'own'
                  ? 'border-hair bg-glass border-b [&>th]:border-lit'
                  : 'border-hair border-b [&>th]:border-l-transparent'
              }
            >
              <th scope="row" className="border-l-[6px] py-2 pr-3 pl-2 font-words">
                <span className="font-strong">{row.name}</span>
                <span className="text-s text-ink-2 block">{row.flags}</span>
              </th>
              <td className="text-s py-2 pr-3 font-mono">{row.jones}</td>
              <td className="py-2 pr-1 text-right">
                <span className="font-strong">{row.hand}</span>
                <span className="text-s text-ink-2 block font-mono">{row.s3}</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="text-s text-ink-2 mt-2">
        S3 stands under the hand, with the sign that the convention gives it. The field turns the same way in
        all of them.{' '}
        <TextLink to={conventionsHref('state', source, own)}>Side by side, with the field</TextLink>
      </p>
    </section>
  );
}

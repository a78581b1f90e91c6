import { CopyText } from '../../components/CopyText';
import { SectionHead } from '../../components/SectionHead';
import { useWidth } from '../../lib/use-width';
import type { ComparedWritten } from './compare-written';
import { comparisonSentence } from './comparison-sentence';
import { comparisonText, writtenInWords } from './comparison-text';
import { ComparisonBlocks } from './ComparisonBlocks';
import { ComparisonTable } from './ComparisonTable';
import { anchorSentence } from './light-words';
import { degreeSentence } from './LightFigure';
import { plateSentence } from './UnitaryFigure';

type Compared = Extract<ComparedWritten, { kind: 'state' | 'unitary' }>;

/** Where a row of the table has its columns without running into each other. */
const TABLE_FROM_PX = { state: 1020, unitary: 860 } as const;
/** Where it also has a column for what agrees. */
const WHOLE_TABLE_FROM_PX = 1200;
const DEFAULT_WIDTH = 1200;

function factsOf(written: Compared): readonly string[] {
  if (written.kind === 'unitary') return [plateSentence(written.unitary)];
  const degree = degreeSentence(written.stokes);
  return [anchorSentence(written.stokes), ...(degree === null ? [] : [degree])];
}

/** What is typed, as every convention writes it, one sentence above and the whole of it as text below. */
export function Comparison({ written, source }: { readonly written: Compared; readonly source: string }) {
  const [box, width] = useWidth<HTMLDivElement>(DEFAULT_WIDTH);
  const { kind, rows } = written;
  const typed = rows.find((row) => row.typed) ?? rows[0];
  // A stranger's own convention is the one they typed in.
  const writer = typed === rows[0] || rows[0]?.sameFlags === true ? 'you' : 'typed';
  const caption =
    kind === 'state'
      ? 'The same light as each convention writes it'
      : 'The same unitary as each convention writes it';
  return (
    <section aria-labelledby="comparison">
      <SectionHead id="comparison">In each convention</SectionHead>
      <p className="mt-2 mb-3 text-[1.125rem] leading-6" role="status">
        {comparisonSentence({ kind, rows, writer })}
      </p>
      <div ref={box}>
        {width >= TABLE_FROM_PX[kind] ? (
          <ComparisonTable rows={rows} caption={caption} compact={width < WHOLE_TABLE_FROM_PX} />
        ) : (
          <ComparisonBlocks rows={rows} caption={caption} />
        )}
      </div>
      <p className="text-s text-ink-2 mt-2 max-w-[60rem]">
        {kind === 'state'
          ? 'ψ is the azimuth of the long axis, χ the ellipticity with the sign that the convention gives S3. Bloch x, y, z are those of the light as the Jones vector is written, H at +z. '
          : 'The matrix stands with determinant 1; a phase of the whole changes no light. '}
        Read, from memory or filled in: how well each flag of a set is known; the sources stand below.
      </p>
      {typed !== undefined && (
        <CopyText
          action="Copy as text"
          name="the comparison as text"
          about="Lines of comma-separated values, each with its convention’s name and flags."
          copied="Copied, one convention a line."
          text={comparisonText({
            kind,
            source,
            writtenIn: writtenInWords(typed),
            facts: factsOf(written),
            rows,
          })}
        />
      )}
    </section>
  );
}

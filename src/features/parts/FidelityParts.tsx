import type { ReactNode } from 'react';
import { FidelityChip } from '../../components/FidelityChip';
import { Formula } from '../../components/Formula';
import { Scientific } from '../../components/Scientific';
import { SectionHead } from '../../components/SectionHead';

const tolerance = 4.9e-4;

function Line({
  chip,
  words,
  children,
}: {
  readonly chip: ReactNode;
  readonly words: ReactNode;
  readonly children: ReactNode;
}) {
  return (
    <div>
      {chip}
      <p className="mt-1 text-[0.9375rem]">
        {words} {children}
      </p>
    </div>
  );
}

/** The fidelity chip with each of its verdicts. */
export function FidelityParts() {
  return (
    <section aria-labelledby="fidelity">
      <SectionHead size="small" id="fidelity">
        Fidelity: <Formula latex="1-F" source="1 − F" /> on a log scale, better to the right, the bracket is
        the tolerance
      </SectionHead>
      <div className="mt-1 flex flex-wrap justify-between gap-y-4">
        <Line
          chip={
            <FidelityChip
              kind="measured"
              tolerance={tolerance}
              infidelity={{ value: 1.8e-4, low: 1.2e-4, high: 2.6e-4 }}
            />
          }
          words={<b>within</b>}
        >
          <Scientific value={1.8e-4} sigma={0.5e-4} exponent={-4} />
        </Line>
        <Line
          chip={
            <FidelityChip
              kind="measured"
              tolerance={tolerance}
              infidelity={{ value: 4.6e-4, low: 3.6e-4, high: 6.2e-4 }}
            />
          }
          words={<b>not decided</b>}
        >
          <Scientific value={4.6e-4} sigma={0.8e-4} exponent={-4} />
        </Line>
        <Line
          chip={
            <FidelityChip
              kind="measured"
              tolerance={tolerance}
              infidelity={{ value: 11e-4, low: 8.6e-4, high: 14e-4 }}
            />
          }
          words={<b className="text-fault">not within</b>}
        >
          <Scientific value={11e-4} sigma={1.4e-4} exponent={-4} />
        </Line>
        <Line
          chip={
            <FidelityChip
              kind="predicted"
              tolerance={tolerance}
              infidelity={{ value: 1.8e-5, low: 1e-6, high: 5.4e-5 }}
              before={{ value: 2.5e-5, low: 1.2e-6, high: 7.8e-5 }}
            />
          }
          words={<b>predicted</b>}
        >
          <Scientific value={0.2e-4} exponent={-4} />
        </Line>
      </div>
    </section>
  );
}

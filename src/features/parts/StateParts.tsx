import { BeamCutOff, BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { SectionHead } from '../../components/SectionHead';

/** The four states of a short beam. */
export function StateParts() {
  return (
    <section aria-labelledby="states">
      <SectionHead size="small" id="states">
        Nothing yet, working, gone wrong, cut off
      </SectionHead>
      <div className="mt-1 grid gap-x-4 gap-y-6 sm:grid-cols-4">
        <BeamEmpty title="No targets yet">Write one, paste a list, or take the six Pauli states.</BeamEmpty>
        <BeamWorking doing="Solving" unit="row" done={3} total={8} atOnce>
          The rows done already can be read.
        </BeamWorking>
        <BeamWrong title="Line 14 has no power">
          It reads “312.0;”. Put a number after the semicolon, or drop the line.
        </BeamWrong>
        <BeamCutOff title="No network since 09:43">
          Three readings wait here and go out by themselves.
        </BeamCutOff>
      </div>
    </section>
  );
}

import { BeamWrong } from '../../components/BeamState';

/** What a page says to a person who may not do what its address asks for. */
export function RefusedTask({ refusal }: { readonly refusal: string | null }) {
  if (refusal === null) return null;
  return (
    <BeamWrong title={refusal} className="mb-6">
      Ask the lab’s lead for that role.
    </BeamWrong>
  );
}

import { Button } from '../../components/Button';

/** One field that two people changed. */
export interface EditDifference {
  readonly field: string;
  readonly theirs: string;
  readonly yours: string;
}

/** Somebody saved while this person was editing: both sides, and the two ways on. Nothing is overwritten unseen. */
export function EditConflict(props: {
  readonly name: string;
  readonly differences: readonly EditDifference[];
  readonly onKeepYours: () => void;
  readonly onTakeTheirs: () => void;
}) {
  const { name, differences, onKeepYours, onTakeTheirs } = props;
  return (
    <section role="alert" className="border-fault space-y-3 border-t-[1.5px] pt-3">
      <h3 className="text-section">{name} was changed while you were editing it</h3>
      {differences.length === 0 ? (
        <p>What stands there now is what you typed. Take it, or save yours again.</p>
      ) : (
        <table className="w-full text-left">
          <thead className="text-s text-ink-2">
            <tr className="border-hair border-b">
              <th scope="col" className="py-1 pr-4 font-words">
                field
              </th>
              <th scope="col" className="py-1 pr-4 font-words">
                as it stands now
              </th>
              <th scope="col" className="py-1 font-words">
                as you typed it
              </th>
            </tr>
          </thead>
          <tbody>
            {differences.map(({ field, theirs, yours }) => (
              <tr key={field} className="border-hair border-b">
                <th scope="row" className="py-1.5 pr-4 font-words">
                  {field}
                </th>
                <td className="py-1.5 pr-4">{theirs === '' ? '—' : theirs}</td>
                <td className="font-strong py-1.5">{yours === '' ? '—' : yours}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <div className="flex flex-wrap gap-3">
        <Button onClick={onKeepYours}>Save yours over it</Button>
        <Button onClick={onTakeTheirs}>Take what stands there</Button>
      </div>
    </section>
  );
}

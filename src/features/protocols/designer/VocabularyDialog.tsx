import { VOCABULARY, type VocabularyEntry } from '../../../../shared/optics/expression/vocabulary';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { TextButton } from '../../../components/TextLink';

interface VocabularyDialogProps {
  readonly mode: 'state' | 'unitary';
  /** Puts an example into the row; null where nothing may be written. */
  readonly onUse: ((example: string) => void) | null;
  readonly onClose: () => void;
}

const groups: Readonly<
  Record<
    VocabularyDialogProps['mode'],
    readonly { readonly title: string; readonly kinds: readonly VocabularyEntry['kind'][] }[]
  >
> = {
  state: [
    { title: 'States', kinds: ['state'] },
    { title: 'Unitaries, in front of a state', kinds: ['unitary', 'word'] },
    { title: 'Numbers and units', kinds: ['number', 'unit'] },
  ],
  unitary: [
    { title: 'Unitaries', kinds: ['unitary', 'word'] },
    { title: 'States, as an axis or an end', kinds: ['state'] },
    { title: 'Numbers and units', kinds: ['number', 'unit'] },
  ],
};

/** Everything that can be written, each with an example that reads as it stands. */
export function VocabularyDialog({ mode, onUse, onClose }: VocabularyDialogProps) {
  return (
    <Dialog
      open
      wide
      question="What can be written here?"
      onClose={onClose}
      actions={<Button onClick={onClose}>Back to the row</Button>}
    >
      <p className="m-0">
        Sums, products, brackets and powers as on paper; √, π, ° and · are taken too. A product acts from the
        right; plates side by side, such as <code className="font-mono">qwp(45deg) hwp(10deg)</code>, stand in
        beam order. Every angle needs deg or rad.
      </p>
      {groups[mode].map(({ title, kinds }) => (
        <section key={title}>
          <h3 className="m-0 mb-1 text-body font-section">{title}</h3>
          <table className="w-full text-left">
            <thead className="sr-only">
              <tr>
                <th scope="col">written</th>
                <th scope="col">meaning</th>
                <th scope="col">example</th>
              </tr>
            </thead>
            <tbody>
              {VOCABULARY.filter(({ kind }) => kinds.includes(kind)).map((entry) => (
                <tr key={entry.insert} className="border-t border-hair align-baseline">
                  <th scope="row" className="py-1 pr-4 font-mono text-s whitespace-nowrap font-words">
                    {entry.signature}
                  </th>
                  <td className="py-1 pr-4">{entry.help}</td>
                  <td className="py-1 font-mono text-s">
                    {onUse !== null && kinds.includes(mode) ? (
                      <TextButton onClick={() => onUse(entry.example)}>{entry.example}</TextButton>
                    ) : (
                      entry.example
                    )}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </section>
      ))}
    </Dialog>
  );
}

import { useTheme } from '../app/theme';
import { TextButton } from './TextLink';
import { SegmentedChoice } from './SegmentedChoice';

interface NavLab {
  readonly id: string;
  readonly name: string;
}

export interface NavPerson {
  readonly name: string;
  readonly initials: string;
}

export interface PersonActions {
  readonly onSignOut: () => void;
  readonly onSignOutEverywhere: () => void;
  /** The person's labs; with fewer than two there is nothing to switch. */
  readonly labs?: readonly NavLab[] | undefined;
  readonly currentLabId?: string | undefined;
  readonly onSwitchLab?: ((labId: string) => void) | undefined;
}

/** What belongs to the person: light, labs, the way out. The same at the end of the beam and behind the phone's splitter. */
export function PersonPanel({
  onSignOut,
  onSignOutEverywhere,
  labs = [],
  currentLabId,
  onSwitchLab,
}: PersonActions) {
  const choice = useTheme((state) => state.choice);
  const choose = useTheme((state) => state.choose);
  const others = labs.filter(({ id }) => id !== currentLabId);
  return (
    <div className="space-y-4 text-body">
      <SegmentedChoice
        label="Pages are lit"
        value={choice}
        onChange={choose}
        segments={[
          { value: 'day', label: 'day' },
          { value: 'evening', label: 'evening' },
          { value: 'system', label: 'as the system' },
        ]}
      />
      {onSwitchLab !== undefined && others.length > 0 && (
        <div>
          <p className="text-s text-ink-2">Go to another lab</p>
          <ul className="m-0 mt-1 list-none space-y-2 p-0">
            {others.map((lab) => (
              <li key={lab.id}>
                <TextButton
                  onClick={() => {
                    onSwitchLab(lab.id);
                  }}
                >
                  {lab.name}
                </TextButton>
              </li>
            ))}
          </ul>
        </div>
      )}
      <p className="flex flex-wrap gap-x-6 gap-y-2 border-t border-hair pt-4">
        <TextButton onClick={onSignOut}>Sign out</TextButton>
        <TextButton onClick={onSignOutEverywhere}>Sign out everywhere</TextButton>
      </p>
    </div>
  );
}

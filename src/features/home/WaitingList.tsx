import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import type { WaitingItem } from '../../../shared/schemas/home';
import { TextLink } from '../../components/TextLink';
import { useCommands } from '../../lib/commands';
import { useLab } from '../labs';
import { WaitingSign } from './WaitingSign';
import { waitingWords } from './waiting-words';

/** Two items of one kind about different things need different keys. */
function keyOf(item: WaitingItem): string {
  switch (item.kind) {
    case 'run-stands':
      return `${item.kind} ${item.run.id}`;
    case 'dialled-not-within':
      return `${item.kind} ${item.run.id} ${item.label}`;
    case 'draft-ahead':
      return `${item.kind} ${item.protocolId}`;
    case 'calibration-due':
    case 'calibrated-elsewhere':
    case 'plate-not-ready':
    case 'open-question':
      return `${item.kind} ${item.plateId}`;
    case 'stale-versions':
      return `${item.kind} ${item.subject.id}`;
    default:
      return item.kind;
  }
}

/** What waits for this person, as sentences with a sign, a reason and one way on. `j` and `k` move, Enter opens. */
export function WaitingList(props: {
  readonly items: readonly WaitingItem[];
  readonly cabinet: readonly CabinetPlate[];
  readonly now: Date;
}) {
  const { items, cabinet, now } = props;
  const { lab, may } = useLab();
  const navigate = useNavigate();
  const rows = useRef<HTMLOListElement>(null);
  const [current, setCurrent] = useState<number | null>(null);
  const words = items.map((item) =>
    waitingWords(item, { labId: lab.id, now, dueDays: lab.calibrationDueDays, may }),
  );

  const move = (step: 1 | -1) => {
    const next = Math.min(
      Math.max((current ?? (step === 1 ? -1 : items.length)) + step, 0),
      items.length - 1,
    );
    setCurrent(next);
    const row = rows.current?.children.item(next);
    if (row instanceof HTMLElement) {
      row.scrollIntoView({ block: 'nearest' });
      row.querySelector('a')?.focus();
    }
  };
  useCommands([
    {
      id: 'home.next',
      label: 'Go to the next thing that waits',
      keys: ['j'],
      when: () => items.length > 0,
      run: () => move(1),
    },
    {
      id: 'home.previous',
      label: 'Go to the thing before',
      keys: ['k'],
      when: () => items.length > 0,
      run: () => move(-1),
    },
    {
      id: 'home.open',
      label: 'Open the thing that is lit',
      keys: ['Enter'],
      // A link or a button that has the focus answers Enter by itself.
      when: () => current !== null && document.activeElement === document.body,
      run: () => {
        const way = current === null ? null : words[current]?.way;
        if (way !== null && way !== undefined) void navigate(way.to);
      },
    },
  ]);

  return (
    <ol ref={rows} aria-label="What waits for you">
      {items.map((item, index) => {
        const { title, reason, way } = words[index] ?? { title: null, reason: null, way: null };
        return (
          <li
            key={keyOf(item)}
            onFocus={() => setCurrent(index)}
            className={`border-hair grid grid-cols-[3.5rem_1fr] items-center gap-x-4 border-b py-3.5 sm:min-h-[5.3125rem] sm:grid-cols-[3.5rem_1fr_auto] ${
              index === current ? 'bg-glass' : ''
            }`}
          >
            <div className="flex justify-center self-start pt-1.5 sm:self-center sm:pt-0">
              <WaitingSign item={item} cabinet={cabinet} dueDays={lab.calibrationDueDays} now={now} />
            </div>
            <div className="min-w-0">
              <p className="text-home">{title}</p>
              <p className="text-ink-2 mt-0.5">{reason}</p>
            </div>
            {way !== null && (
              <p className="text-home max-sm:col-start-2 max-sm:mt-2 sm:pl-4">
                <TextLink to={way.to}>{way.label}</TextLink>
              </p>
            )}
          </li>
        );
      })}
    </ol>
  );
}

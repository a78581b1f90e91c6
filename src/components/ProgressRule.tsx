import { classNames } from './class-names';

export interface RuleDivision {
  /** What the division belongs to; a run of the same label makes one group. */
  readonly group: string;
  readonly state: 'done' | 'skipped' | 'current' | 'ahead';
}

interface ProgressRuleProps {
  readonly divisions: readonly RuleDivision[];
  /** In words: "setting 9 of 24". */
  readonly label: string;
  readonly showGroups?: boolean;
  readonly className?: string | undefined;
}

interface Group {
  readonly label: string;
  readonly start: number;
  readonly end: number;
}

function groupsOf(divisions: readonly RuleDivision[]): readonly Group[] {
  const groups: Group[] = [];
  divisions.forEach(({ group }, index) => {
    const last = groups.at(-1);
    if (last?.label === group) groups[groups.length - 1] = { ...last, end: index + 1 };
    else groups.push({ label: group, start: index, end: index + 1 });
  });
  return groups;
}

/** Progress as an engraved rule, one division per setting. An open one was skipped; the index stands at the present one. */
export function ProgressRule({ divisions, label, showGroups = true, className }: ProgressRuleProps) {
  const count = Math.max(1, divisions.length);
  const at = (index: number): string => `${((index / count) * 100).toFixed(3)}%`;
  const groups = groupsOf(divisions);
  const done = divisions.filter(({ state }) => state === 'done').length;
  const current = divisions.findIndex(({ state }) => state === 'current');
  const currentGroup = divisions[current]?.group;
  return (
    <div
      role="progressbar"
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={divisions.length}
      aria-valuenow={done}
      aria-valuetext={label}
      className={className}
    >
      <svg aria-hidden="true" width="100%" height={showGroups ? 58 : 44} className="block overflow-visible">
        {divisions.map(({ state }, index) => (
          <g key={index}>
            {index > 0 && (
              <line x1={at(index)} x2={at(index)} y1="15" y2="30" className="stroke-rule" strokeWidth="1" />
            )}
            {state !== 'ahead' && (
              <svg x={at(index)} width={`${100 / count}%`} overflow="visible">
                <rect
                  x="8%"
                  y="18.5"
                  width="84%"
                  height="9.5"
                  strokeWidth={state === 'skipped' ? 1.2 : 0}
                  className={classNames(
                    state === 'skipped' && 'fill-none stroke-ink',
                    state === 'done' && 'fill-ink-3',
                    state === 'current' && 'fill-act',
                  )}
                />
              </svg>
            )}
          </g>
        ))}
        {groups.map(({ start }) => (
          <line
            key={start}
            x1={at(start)}
            x2={at(start)}
            y1="0"
            y2="30"
            strokeWidth="1.6"
            className={start <= current ? 'stroke-ink' : 'stroke-rule'}
          />
        ))}
        <line x1="100%" x2="100%" y1="0" y2="30" className="stroke-rule" strokeWidth="1.6" />
        <line x1="0" x2="100%" y1="30" y2="30" className="stroke-rule" strokeWidth="1.4" />
        {current >= 0 && (
          <svg x={at(current + 0.5)} y="34" overflow="visible">
            <path d="M0 0L7 12H-7Z" className="fill-act" />
          </svg>
        )}
        {showGroups &&
          groups.map(({ label: text, start, end }) => (
            <text
              key={start}
              x={at((start + end) / 2)}
              y="46"
              textAnchor="middle"
              fontSize="16"
              className={classNames(text === currentGroup ? 'fill-act font-section' : 'fill-ink-2')}
            >
              {text}
            </text>
          ))}
      </svg>
    </div>
  );
}

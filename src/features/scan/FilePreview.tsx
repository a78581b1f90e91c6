import {
  ANGLE_UNITS,
  POWER_UNITS,
  type ScanPreview,
  type ScanRole,
  type Understood,
  unitLabel,
} from '../../../shared/scan-file';
import { edgeFade } from '../../components/edge-fade';
import { controlBox } from '../../components/Field';
import { type ColumnRoles, roleOf, withRole } from './column-roles';

interface FilePreviewProps {
  readonly understood: Understood;
  readonly roles: ColumnRoles;
  /** Behind known light a power is a power, whatever its port. */
  readonly isKnownLight: boolean;
  readonly onRoles: (roles: ColumnRoles) => void;
}

const linearRoles: readonly (readonly [ScanRole, string])[] = [
  ['dial', 'dial'],
  ['crossed', 'crossed power'],
  ['parallel', 'parallel power'],
  ['crossedSigma', 'σ of crossed'],
  ['parallelSigma', 'σ of parallel'],
];
const knownRoles: readonly (readonly [ScanRole, string])[] = [
  ['dial', 'dial'],
  ['crossed', 'power'],
  ['crossedSigma', 'σ of power'],
];

/** The first rows as they were understood, and which column is what, to be changed in the head. */
export function FilePreview({ understood, roles, isKnownLight, onRoles }: FilePreviewProps) {
  const { preview } = understood;
  return (
    <>
      <p className="text-s text-ink-2 mt-3">{factWords(preview)}</p>
      <div
        ref={edgeFade}
        className="mt-2 overflow-x-auto"
        tabIndex={0}
        role="region"
        aria-label="First rows of the file"
      >
        <table className="text-body border-collapse">
          <caption className="sr-only">First rows of the file, and which column is what</caption>
          <thead>
            <tr className="align-bottom">
              <th scope="col" className="text-s font-words text-ink-2 pr-3 text-left">
                line
              </th>
              {preview.columns.map(({ number, name, unit }) => (
                <th key={number} scope="col" className="min-w-34 px-1.5 text-left">
                  <span className="text-s font-words block max-w-40 truncate">
                    {name ?? `column ${number}`}
                    {unit === null ? '' : `, ${unit}`}
                  </span>
                </th>
              ))}
            </tr>
            <tr className="border-ink border-b-[1.5px]">
              <th scope="row" className="text-s font-words text-ink-2 pr-3 pb-2 text-left">
                is
              </th>
              {preview.columns.map(({ number, name }) => (
                <td key={number} className="px-1.5 pb-2">
                  <ColumnSelects
                    column={number - 1}
                    label={name ?? `column ${number}`}
                    {...{ roles, isKnownLight, onRoles }}
                  />
                </td>
              ))}
            </tr>
          </thead>
          <tbody>
            {preview.rows.map(({ line, cells }) => (
              <tr key={line} className="border-hair border-b">
                <th scope="row" className="text-s font-words text-ink-2 py-1 pr-3 text-left font-mono">
                  {line}
                </th>
                {cells.map((cell, at) => (
                  <td
                    key={`${line} ${preview.columns[at]?.number ?? at}`}
                    className="max-w-40 truncate px-1.5 py-1 font-mono text-[0.875rem]"
                  >
                    {cell}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {preview.rowCount > preview.rows.length && (
        <p className="text-s text-ink-2 mt-1">and {preview.rowCount - preview.rows.length} more rows</p>
      )}
    </>
  );
}

function ColumnSelects(props: {
  readonly column: number;
  readonly label: string;
  readonly roles: ColumnRoles;
  readonly isKnownLight: boolean;
  readonly onRoles: (roles: ColumnRoles) => void;
}) {
  const { column, label, roles, isKnownLight, onRoles } = props;
  const role = roleOf(roles, column);
  const choices = isKnownLight ? knownRoles : linearRoles;
  // What a scan between polarisers had as the parallel port stays chosen until it is changed.
  const others =
    role !== null && !choices.some(([one]) => one === role)
      ? linearRoles.filter(([one]) => one === role)
      : [];
  const unit = role === null ? null : (roles[role]?.unit ?? null);
  const setUnit = (value: string) => {
    if (role === null) return;
    if (role === 'dial') {
      const found = ANGLE_UNITS.find((one) => one === value) ?? null;
      onRoles({ ...roles, dial: { column, unit: found } });
    } else {
      onRoles({ ...roles, [role]: { column, unit: POWER_UNITS.find((one) => one === value) ?? null } });
    }
  };
  const box = `${controlBox} h-9 px-1.5 text-s`;
  return (
    <>
      <select
        aria-label={`what ${label} is`}
        value={role ?? ''}
        onChange={({ target }) =>
          onRoles(withRole(roles, column, linearRoles.find(([one]) => one === target.value)?.[0] ?? null))
        }
        className={box}
      >
        <option value="">not used</option>
        {[...choices, ...others].map(([value, words]) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </select>
      {role !== null && (
        <select
          aria-label={`unit of ${label}`}
          value={unit ?? ''}
          onChange={({ target }) => setUnit(target.value)}
          className={box}
        >
          <option value="">unit as written</option>
          {(role === 'dial' ? ANGLE_UNITS : POWER_UNITS).map((one) => (
            <option key={one} value={one}>
              {unitLabel(one)}
            </option>
          ))}
        </select>
      )}
    </>
  );
}

const delimiterWords = {
  comma: 'commas',
  semicolon: 'semicolons',
  tab: 'tabs',
  pipe: 'pipes',
  spaces: 'spaces',
} as const;
const decimalWords = {
  point: 'decimal points',
  comma: 'decimal commas',
  none: 'whole numbers only',
} as const;

/** How the file was understood, in one sentence. */
export function factWords(preview: ScanPreview): string {
  const { encoding, delimiter, decimalSign, commentLineCount, headerLine, rowCount } = preview;
  const comments =
    commentLineCount === 0
      ? 'no comments'
      : commentLineCount === 1
        ? 'one comment line'
        : `${commentLineCount} comment lines`;
  const header = headerLine === null ? 'no header' : `header in line ${headerLine}`;
  return `${rowCount} rows. ${encoding}, ${delimiterWords[delimiter]} between the columns, ${decimalWords[decimalSign]}, ${header}, ${comments}.`;
}

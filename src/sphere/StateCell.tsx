import type { StateWords } from './state-words';

/** A state in a table of words, with its Stokes parameters under it. */
export function StateCell({ state }: { readonly state: StateWords }) {
  return (
    <td>
      {state.text}
      <span className="path-stokes">{state.shown.map(formatStokes).join(', ')}</span>
    </td>
  );
}

function formatStokes(value: number): string {
  const text = Math.abs(value).toFixed(4);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}

/** How evenly a column goes up or down; the dial of a scan does so most of all. In the order of evenness. */
export type Steps = 'even' | 'nearly even' | 'one way' | 'none';

const EVEN = 1e-6;
const NEARLY_EVEN = 0.05;
const FEWEST = 4;

/** Of values in the order of the rows. Fewer than four say nothing, and neither do those with NaN among them. */
export function stepsOf(values: Float64Array): Steps {
  const [first, last] = [values[0] ?? 0, values.at(-1) ?? 0];
  const mean = (last - first) / (values.length - 1);
  if (values.length < FEWEST || mean === 0 || !Number.isFinite(mean)) return 'none';
  let worst = 0;
  let isOneWay = true;
  for (let at = 1; at < values.length; at += 1) {
    const step = (values[at] ?? 0) - (values[at - 1] ?? 0);
    worst = Math.max(worst, Math.abs(step / mean - 1));
    if (!(step / mean >= 0)) isOneWay = false;
  }
  if (worst <= EVEN) return 'even';
  if (worst <= NEARLY_EVEN) return 'nearly even';
  return isOneWay ? 'one way' : 'none';
}

const ORDER: readonly Steps[] = ['even', 'nearly even', 'one way'];

/** The one column that is more even than all others; null where there is none, or several. */
export function evenestColumn(steps: ReadonlyMap<number, Steps>): number | null {
  for (const wanted of ORDER) {
    const [column, another] = [...steps].filter(([, kind]) => kind === wanted).map(([at]) => at);
    if (column !== undefined) return another === undefined ? column : null;
  }
  return null;
}

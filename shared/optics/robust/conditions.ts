import type { Goal } from '../goal';
import { gaussLegendre } from './gauss-legendre';
import type { ResidualFunction } from './least-squares';
import { coefficientScale } from './robustness';
import { type ErringPlates, missForms, StackJet } from './stack-jet';

/** The two questions put to the angles, each as residuals with exact derivatives. */
export interface Conditions {
  /** Zero where the goal is met at no error and the first `level` derivatives of the miss vanish; scaled to order 1. */
  readonly flatTo: (level: number) => ResidualFunction;
  /** Its squares sum to the average infidelity over ±width; `size` rows for each error looked at. */
  readonly average: ResidualFunction;
  readonly size: number;
}

// Fewer points than the final figure's: the search need not know the average to its last digits.
const SEARCH_NODES = 12;

export function conditionsFor(goal: Goal, plates: ErringPlates, width: number): Conditions {
  const forms = missForms(goal);
  const n = plates.retardancesRad.length;
  return {
    size: forms.length,
    flatTo: (level) => {
      const jet = new StackJet(plates, forms, 0, level);
      const rows = jet.size * (level + 1);
      const [value, jacobian] = [new Float64Array(rows), new Float64Array(rows * n)];
      const scales = Array.from({ length: level + 1 }, (_, j) => {
        const scale = coefficientScale(plates.errorPerUnitRad, j);
        return scale > 0 ? 1 / scale : 0;
      });
      return (angles) => {
        jet.at(angles);
        for (let r = 0; r < rows; r += 1) {
          const scale = scales[Math.floor(r / jet.size)] ?? 0;
          value[r] = scale * (jet.value[r] ?? 0);
          for (let k = 0; k < n; k += 1) jacobian[r * n + k] = scale * (jet.byAngle[r * n + k] ?? 0);
        }
        return { rows, value, jacobian };
      };
    },
    average: averageResiduals(
      gaussLegendre(SEARCH_NODES).map(({ at, weight }) => ({
        jet: new StackJet(plates, forms, at * width, 0),
        scale: Math.sqrt(weight),
      })),
      n,
    ),
  };
}

function averageResiduals(
  nodes: readonly { readonly jet: StackJet; readonly scale: number }[],
  n: number,
): ResidualFunction {
  const rows = nodes.reduce((sum, { jet }) => sum + jet.size, 0);
  const [value, jacobian] = [new Float64Array(rows), new Float64Array(rows * n)];
  return (angles) => {
    let row = 0;
    for (const { jet, scale } of nodes) {
      jet.at(angles);
      for (let i = 0; i < jet.size; i += 1) {
        value[row] = scale * (jet.value[i] ?? 0);
        for (let k = 0; k < n; k += 1) jacobian[row * n + k] = scale * (jet.byAngle[i * n + k] ?? 0);
        row += 1;
      }
    }
    return { rows, value, jacobian };
  };
}

import { sincos } from '../elementary';
import type { Goal } from '../goal';
import { stokesToJones, normaliseStokes, type Stokes } from '../stokes';
import { compose, conjugate, type Quaternion } from '../quaternion';

/**
 * What a stack of plates misses its goal by, as a vector whose squared length is 1 − F, with its Taylor coefficients in
 * the error and its exact derivatives by every angle.
 *
 * The stack's unit quaternion is U = q_n … q_1, q = (cos h, sin h (sin 2θ, 0, cos 2θ)), h = (δ + e·error)/2. For a unitary T the
 * miss is √⅔ times the vector part of U T̄ (references.md 5: average gate infidelity ⅔ sin²(ε/2)); for states s → t it
 * is the amplitude of the state opposite to t. Both are linear in U, so they keep their digits down to 1e-16.
 */
export interface MissedBy {
  readonly plateCount: number;
  /** Entries of the vector: 3 for a unitary, 2 for a state. */
  readonly size: number;
  /** Highest Taylor coefficient kept. */
  readonly order: number;
  /** Coefficient j of entry i at [j · size + i]. */
  readonly value: Float64Array;
  /** Its derivative by angle k at [(j · size + i) · plateCount + k]. */
  readonly byAngle: Float64Array;
}

/** Plates whose retardance changes with an error. */
export interface ErringPlates {
  readonly retardancesRad: readonly number[];
  /** Change of each retardance per unit of the error. */
  readonly errorPerUnitRad: readonly number[];
}

/** The linear forms that make the miss of U: as many quaternions as it has entries. */
export type MissForms = readonly Quaternion[];

const UNITS: readonly Quaternion[] = [
  { w: 0, x: 1, y: 0, z: 0 },
  { w: 0, x: 0, y: 1, z: 0 },
  { w: 0, x: 0, y: 0, z: 1 },
];

/** @throws RangeError for a Stokes vector of length 0. */
export function missForms(goal: Goal): MissForms {
  if (goal.kind === 'apply') {
    const scale = Math.sqrt(2 / 3);
    return UNITS.map((unit) => {
      const { w, x, y, z } = compose(unit, goal.target);
      return { w: scale * w, x: scale * x, y: scale * y, z: scale * z };
    });
  }
  // With a taking H to s and b taking H to t, b̄Ua must leave H alone; what it makes of V is its x and y parts.
  const a = fromH(goal.input);
  const b = fromH(goal.target);
  return UNITS.slice(0, 2).map((unit) => compose(b, compose(unit, conjugate(a))));
}

// The unitary whose first column is the state's Jones vector.
function fromH(state: Stokes): Quaternion {
  const { aRe, aIm, bRe, bIm } = stokesToJones(normaliseStokes(state));
  return { w: aRe, x: -bIm, y: bRe, z: -aIm };
}

/** The miss around one value of the error, its plates' Taylor coefficients worked out once for all angles. */
export class StackJet implements MissedBy {
  readonly plateCount: number;
  readonly size: number;
  readonly value: Float64Array;
  readonly byAngle: Float64Array;
  // Taylor coefficients of cos h and sin h, plate by plate.
  private readonly cosHalf: Float64Array;
  private readonly sinHalf: Float64Array;
  // Products of the plates before each plate, and the forms carried back through the plates behind it: quaternion jets.
  private readonly before: Float64Array;
  private readonly forms: Float64Array;
  private readonly axis: { readonly cos: number; readonly sin: number }[] = [];

  constructor(
    { retardancesRad, errorPerUnitRad }: ErringPlates,
    private readonly ends: MissForms,
    error: number,
    readonly order: number,
  ) {
    this.plateCount = retardancesRad.length;
    this.size = ends.length;
    const terms = order + 1;
    this.value = new Float64Array(this.size * terms);
    this.byAngle = new Float64Array(this.size * terms * this.plateCount);
    this.cosHalf = new Float64Array(this.plateCount * terms);
    this.sinHalf = new Float64Array(this.plateCount * terms);
    this.before = new Float64Array((this.plateCount + 1) * terms * 4);
    this.forms = new Float64Array(this.size * terms * 4);
    retardancesRad.forEach((retardance, k) => {
      const slope = errorPerUnitRad[k] ?? 0;
      const half = sincos((retardance + slope * error) / 2);
      let [c, s, scale] = [half.cos, half.sin, 1];
      for (let j = 0; j < terms; j += 1) {
        this.cosHalf[k * terms + j] = scale * c;
        this.sinHalf[k * terms + j] = scale * s;
        [c, s] = [-s, c];
        scale *= slope / 2 / (j + 1);
      }
    });
  }

  /** Fills `value` and `byAngle` for these angles. */
  at(fastAxesRad: ArrayLike<number>): this {
    const { before, cosHalf, sinHalf, plateCount, order } = this;
    const terms = order + 1;
    before.fill(0);
    before[0] = 1;
    for (let k = 0; k < plateCount; k += 1) {
      const { cos, sin } = sincos(2 * (fastAxesRad[k] ?? 0));
      this.axis[k] = { cos, sin };
      const [from, to] = [k * terms, (k + 1) * terms];
      for (let j = 0; j < terms; j += 1) {
        for (let i = 0; i + j < terms; i += 1) {
          addProduct(
            before,
            4 * (to + i + j),
            cosHalf[from + j] ?? 0,
            sinHalf[from + j] ?? 0,
            sin,
            cos,
            before,
            4 * (from + i),
          );
        }
      }
    }
    this.fillValues();
    this.fillDerivatives();
    return this;
  }

  /** Squared length of Taylor coefficient j of the miss; for j = 0 the infidelity itself. */
  squared(j: number): number {
    let sum = 0;
    for (let i = 0; i < this.size; i += 1) {
      const entry = this.value[j * this.size + i] ?? 0;
      sum += entry * entry;
    }
    return sum;
  }

  private fillValues(): void {
    const { value, before, size, plateCount, ends, order } = this;
    for (let j = 0; j <= order; j += 1) {
      const at = 4 * (plateCount * (order + 1) + j);
      for (let i = 0; i < size; i += 1) {
        const form = ends[i];
        if (form === undefined) continue;
        value[j * size + i] =
          form.w * (before[at] ?? 0) +
          form.x * (before[at + 1] ?? 0) +
          form.y * (before[at + 2] ?? 0) +
          form.z * (before[at + 3] ?? 0);
      }
    }
  }

  private fillDerivatives(): void {
    const { forms, ends, size, plateCount, order } = this;
    const terms = order + 1;
    forms.fill(0);
    ends.forEach(({ w, x, y, z }, i) => forms.set([w, x, y, z], 4 * i * terms));
    const carried = new Float64Array(4 * terms);
    for (let k = plateCount - 1; k >= 0; k -= 1) {
      const { cos, sin } = this.axis[k] ?? { cos: 1, sin: 0 };
      const turned = this.turnedProduct(k);
      for (let i = 0; i < size; i += 1) {
        const form = 4 * i * terms;
        for (let j = 0; j < terms; j += 1) {
          let sum = 0;
          for (let p = 0; p <= j; p += 1) sum += dot4(forms, form + 4 * p, turned, 4 * (j - p));
          this.byAngle[(j * size + i) * plateCount + k] = sum;
        }
        // ⟨f, q p⟩ = ⟨q̄ f, p⟩ carries the form to the plate before.
        carried.fill(0);
        for (let j = 0; j < terms; j += 1) {
          const [c, s] = [this.cosHalf[k * terms + j] ?? 0, this.sinHalf[k * terms + j] ?? 0];
          for (let p = 0; p + j < terms; p += 1)
            addProduct(carried, 4 * (p + j), c, -s, sin, cos, forms, form + 4 * p);
        }
        forms.set(carried, form);
      }
    }
  }

  // ∂q/∂θ times the product of the plates before.
  private turnedProduct(k: number): Float64Array {
    const terms = this.order + 1;
    const product = new Float64Array(4 * terms);
    const { cos, sin } = this.axis[k] ?? { cos: 1, sin: 0 };
    for (let j = 0; j < terms; j += 1) {
      const s = 2 * (this.sinHalf[k * terms + j] ?? 0);
      for (let p = 0; p + j < terms; p += 1)
        addProduct(product, 4 * (p + j), 0, s, cos, -sin, this.before, 4 * (k * terms + p));
    }
    return product;
  }
}

// out += (c, s·nx, 0, s·nz) times the quaternion at `at`.
function addProduct(
  out: Float64Array,
  to: number,
  c: number,
  s: number,
  nx: number,
  nz: number,
  right: Float64Array,
  at: number,
): void {
  const [x, z] = [s * nx, s * nz];
  const w0 = right[at] ?? 0;
  const x0 = right[at + 1] ?? 0;
  const y0 = right[at + 2] ?? 0;
  const z0 = right[at + 3] ?? 0;
  out[to] = (out[to] ?? 0) + c * w0 - x * x0 - z * z0;
  out[to + 1] = (out[to + 1] ?? 0) + c * x0 + x * w0 - z * y0;
  out[to + 2] = (out[to + 2] ?? 0) + c * y0 + z * x0 - x * z0;
  out[to + 3] = (out[to + 3] ?? 0) + c * z0 + z * w0 + x * y0;
}

function dot4(a: Float64Array, i: number, b: Float64Array, j: number): number {
  return (
    (a[i] ?? 0) * (b[j] ?? 0) +
    (a[i + 1] ?? 0) * (b[j + 1] ?? 0) +
    (a[i + 2] ?? 0) * (b[j + 2] ?? 0) +
    (a[i + 3] ?? 0) * (b[j + 3] ?? 0)
  );
}

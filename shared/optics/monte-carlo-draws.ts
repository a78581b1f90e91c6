import { type BudgetProblem, checkBudgetProblem, type UncertainPlate } from './budget-problem';
import { sincos, sincosInto } from './elementary';
import { NormalStream } from './normal-stream';
import { checkSeed, splitmixWords, UniformStream } from './uniform-stream';

const BLOCK = 256;
/** Up to here the series below are good to the last bit. */
const SMALL_RAD = 0.125;

/**
 * 1 − F of one draw after the other: every parameter drawn from its own distribution and everything behind it worked out
 * exactly. Retardance, zero, repeatability, polariser and shared drifts are normal; where a dial stands within its step is
 * even. The numbers depend on the problem and the seed only, not on how many are asked for at a time.
 */
export class InfidelityDraws {
  private readonly normals: NormalStream;
  private readonly uniforms: UniformStream;
  /** One row for each draw of a block: shared drifts, polariser, then retardance and angle of each plate. */
  private readonly normalRows: Float64Array;
  private readonly uniformRows: Float64Array;
  private readonly width: number;
  private readonly firstPlateColumn: number;
  private readonly plates: readonly DrawnPlate[];
  /** What the light, or the turn so far, has become in each draw of a block: s1, s2, s3 or w, x, y, z. */
  private readonly parts = [0, 1, 2, 3].map(() => new Float64Array(BLOCK));
  private readonly turn = { sin: 0, cos: 0 };

  /** @throws RangeError for what `errorBudget` refuses and for a seed that isn't a whole number from 0 to 2^53 − 1. */
  constructor(
    private readonly problem: BudgetProblem,
    seed: number,
  ) {
    checkBudgetProblem(problem);
    checkSeed(seed);
    const { goal, plates, shared, sigmaPolariserRad } = problem;
    this.plates = plates.map((plate, index) =>
      drawnPlate(
        plate,
        shared.map(({ sigma, retardancePerUnitRad }) => sigma * (retardancePerUnitRad[index] ?? 0)),
        goal.kind === 'prepare' ? 1 : 0.5,
      ),
    );
    for (const sigma of [sigmaPolariserRad, ...shared.map((drift) => drift.sigma)]) checkSigma(sigma);
    const words = splitmixWords(seed, 12);
    this.normals = new NormalStream(words.subarray(0, 8));
    this.uniforms = new UniformStream(words.subarray(8, 12));
    this.firstPlateColumn = shared.length + (goal.kind === 'prepare' ? 1 : 0);
    this.width = this.firstPlateColumn + 2 * plates.length;
    this.normalRows = new Float64Array(BLOCK * this.width);
    this.uniformRows = new Float64Array(BLOCK * plates.length);
  }

  /** Writes the next `count` draws into `out` from `start` on. */
  fill(out: Float64Array, start: number, count: number): void {
    for (let done = 0; done < count; done += BLOCK) {
      const rows = Math.min(BLOCK, count - done);
      this.normals.fill(this.normalRows, rows * this.width);
      this.uniforms.fillCentred(this.uniformRows, rows * this.plates.length);
      const { goal } = this.problem;
      if (goal.kind === 'prepare') {
        this.enterLight(goal.input, rows);
        this.plates.forEach((plate, index) => this.passLight(plate, index, rows));
        this.compareLight(goal.target, out, start + done, rows);
      } else {
        this.enterTurn(rows);
        this.plates.forEach((plate, index) => this.passTurn(plate, index, rows));
        this.compareTurn(goal.target, out, start + done, rows);
      }
    }
  }

  private enterLight([i1, i2, i3]: readonly [number, number, number], rows: number): void {
    const [s1 = EMPTY, s2 = EMPTY, s3 = EMPTY] = this.parts;
    const { normalRows, width, turn } = this;
    const column = this.firstPlateColumn - 1;
    const scale = 2 * this.problem.sigmaPolariserRad;
    for (let row = 0; row < rows; row += 1) {
      nearby(0, 1, scale * (normalRows[row * width + column] ?? 0), turn);
      s1[row] = turn.cos * i1 - turn.sin * i2;
      s2[row] = turn.sin * i1 + turn.cos * i2;
      s3[row] = i3;
    }
  }

  // Rodrigues' turn of `retardStokes`, at the drawn retardance and angle.
  private passLight(plate: DrawnPlate, index: number, rows: number): void {
    const [p1 = EMPTY, p2 = EMPTY, p3 = EMPTY] = this.parts;
    const { turn } = this;
    for (let row = 0; row < rows; row += 1) {
      nearby(plate.sinTurn, plate.cosTurn, this.turnError(plate, index, row), turn);
      const s = turn.sin;
      const c = turn.cos;
      nearby(plate.sinAxis, plate.cosAxis, this.axisError(plate, index, row), turn);
      const n1 = turn.cos;
      const n2 = turn.sin;
      const s1 = p1[row] ?? 0;
      const s2 = p2[row] ?? 0;
      const s3 = p3[row] ?? 0;
      const along = (1 - c) * (n1 * s1 + n2 * s2);
      p1[row] = c * s1 + s * n2 * s3 + along * n1;
      p2[row] = c * s2 - s * n1 * s3 + along * n2;
      p3[row] = c * s3 + s * (n1 * s2 - n2 * s1);
    }
  }

  private compareLight(
    [t1, t2, t3]: readonly [number, number, number],
    out: Float64Array,
    start: number,
    rows: number,
  ): void {
    const [s1 = EMPTY, s2 = EMPTY, s3 = EMPTY] = this.parts;
    const leak = this.problem.extinction ?? 0;
    const mixed = leak / (1 + leak);
    for (let row = 0; row < rows; row += 1) {
      const d1 = (s1[row] ?? 0) - t1;
      const d2 = (s2[row] ?? 0) - t2;
      const d3 = (s3[row] ?? 0) - t3;
      const pure = Math.min(1, (d1 * d1 + d2 * d2 + d3 * d3) / 4);
      out[start + row] = pure + mixed * (1 - 2 * pure);
    }
  }

  private enterTurn(rows: number): void {
    const [w = EMPTY, x = EMPTY, y = EMPTY, z = EMPTY] = this.parts;
    w.fill(1, 0, rows);
    for (const part of [x, y, z]) part.fill(0, 0, rows);
  }

  // `compose(retarderQuaternion(plate), turn so far)`: a plate's axis lies on the linear equator, so its y is 0.
  private passTurn(plate: DrawnPlate, index: number, rows: number): void {
    const [pw = EMPTY, px = EMPTY, py = EMPTY, pz = EMPTY] = this.parts;
    const { turn } = this;
    for (let row = 0; row < rows; row += 1) {
      nearby(plate.sinTurn, plate.cosTurn, this.turnError(plate, index, row), turn);
      const s = turn.sin;
      const c = turn.cos;
      nearby(plate.sinAxis, plate.cosAxis, this.axisError(plate, index, row), turn);
      const rx = s * turn.sin;
      const rz = s * turn.cos;
      const w = pw[row] ?? 0;
      const x = px[row] ?? 0;
      const y = py[row] ?? 0;
      const z = pz[row] ?? 0;
      pw[row] = c * w - rx * x - rz * z;
      px[row] = c * x + rx * w - rz * y;
      py[row] = c * y - rx * z + rz * x;
      pz[row] = c * z + rx * y + rz * w;
    }
  }

  private compareTurn(
    target: { readonly w: number; readonly x: number; readonly y: number; readonly z: number },
    out: Float64Array,
    start: number,
    rows: number,
  ): void {
    const [pw = EMPTY, px = EMPTY, py = EMPTY, pz = EMPTY] = this.parts;
    const { w: tw, x: tx, y: ty, z: tz } = target;
    for (let row = 0; row < rows; row += 1) {
      const w = pw[row] ?? 0;
      const x = px[row] ?? 0;
      const y = py[row] ?? 0;
      const z = pz[row] ?? 0;
      const vx = x * tw - w * tx - y * tz + z * ty;
      const vy = y * tw - w * ty + x * tz - z * tx;
      const vz = z * tw - w * tz - x * ty + y * tx;
      out[start + row] = (2 / 3) * Math.min(1, vx * vx + vy * vy + vz * vz);
    }
  }

  private turnError(plate: DrawnPlate, index: number, row: number): number {
    const { normalRows, width, firstPlateColumn } = this;
    const first = row * width;
    let error = plate.turnScale * (normalRows[first + firstPlateColumn + 2 * index] ?? 0);
    const { driftScales } = plate;
    for (let k = 0; k < driftScales.length; k += 1)
      error += (driftScales[k] ?? 0) * (normalRows[first + k] ?? 0);
    return error;
  }

  private axisError(plate: DrawnPlate, index: number, row: number): number {
    const { normalRows, uniformRows, width, firstPlateColumn, plates } = this;
    return (
      plate.axisScale * (normalRows[row * width + firstPlateColumn + 2 * index + 1] ?? 0) +
      plate.stepScale * (uniformRows[row * plates.length + index] ?? 0)
    );
  }
}

const EMPTY = new Float64Array(0);

/** A plate with the scale of each of its errors. A unitary is made of half turns: there `turn` is δ/2. */
interface DrawnPlate {
  readonly sinTurn: number;
  readonly cosTurn: number;
  readonly sinAxis: number;
  readonly cosAxis: number;
  readonly turnScale: number;
  readonly driftScales: Float64Array;
  /** Of 2θ: what the zero and the repeatability add, two independent normal errors of one angle. */
  readonly axisScale: number;
  readonly stepScale: number;
}

function drawnPlate(plate: UncertainPlate, drifts: readonly number[], part: number): DrawnPlate {
  const { sigmaRetardanceRad, sigmaOffsetRad, dialRepeatabilityRad, dialResolutionRad } = plate;
  for (const sigma of [sigmaRetardanceRad, sigmaOffsetRad, dialRepeatabilityRad, dialResolutionRad])
    checkSigma(sigma);
  const turn = sincos(part * plate.retardanceRad);
  const axis = sincos(2 * plate.fastAxisRad);
  return {
    sinTurn: turn.sin,
    cosTurn: turn.cos,
    sinAxis: axis.sin,
    cosAxis: axis.cos,
    turnScale: part * sigmaRetardanceRad,
    driftScales: Float64Array.from(drifts, (drift) => part * drift),
    axisScale: 2 * Math.sqrt(sigmaOffsetRad * sigmaOffsetRad + dialRepeatabilityRad * dialRepeatabilityRad),
    stepScale: 2 * dialResolutionRad,
  };
}

function checkSigma(sigma: number): void {
  if (!(sigma >= 0)) throw new RangeError(`a σ must not be negative, got ${sigma}`);
}

// Sine and cosine of an angle that lies `by` beyond one whose sine and cosine are known, by the addition theorems.
function nearby(sin: number, cos: number, by: number, out: { sin: number; cos: number }): void {
  const z = by * by;
  let s = by * (1 + z * (-1 / 6 + z * (1 / 120 + z * (-1 / 5040 + z * (1 / 362_880)))));
  let c = 1 + z * (-1 / 2 + z * (1 / 24 + z * (-1 / 720 + z * (1 / 40_320 - z * (1 / 3_628_800)))));
  if (z > SMALL_RAD * SMALL_RAD) {
    sincosInto(by, out);
    s = out.sin;
    c = out.cos;
  }
  out.sin = sin * c + cos * s;
  out.cos = cos * c - sin * s;
}

/*
 * Random expressions that are right by construction, from a repeatable stream: numbers, angles, states and unitaries nested in
 * each other in every way that the grammar has.
 */

type Random = () => number;

function pick<T>(from: readonly T[], random: Random): T {
  const chosen = from[Math.floor(random() * from.length)];
  if (chosen === undefined) throw new Error('nothing to pick from');
  return chosen;
}

function plain(random: Random): string {
  const kind = random();
  if (kind < 0.4) return String(Math.floor(random() * 9) + 1);
  if (kind < 0.7) return String(Number((random() * 10).toPrecision(3)) + 0.01);
  return pick(['sqrt(2)', '√3', 'pi', '1/2', '2^(1/2)', 'cos(20deg)', 'exp(-0.5)'], random);
}

export function angleText(random: Random): string {
  const size = (random() * 2 - 1) * 180;
  const kind = random();
  if (kind < 0.5) return `${Math.round(size * 4) / 4}${pick(['deg', '°', ' deg'], random)}`;
  if (kind < 0.7) return `${size}deg`;
  if (kind < 0.8) return `${size / 60}rad`;
  if (kind < 0.9) return pick(['pi/4', '-π/3', '2pi/3', '(pi/8 + 3deg)', '3 pi/7'], random);
  return `(${Math.round(size)}deg ${pick(['+', '−'], random)} ${Math.round(random() * 90)}deg)`;
}

function scalar(random: Random): string {
  return pick(
    [
      plain,
      () => 'i',
      () => `e^(i ${bracketed(angleText(random))})`,
      () => `exp(-i ${bracketed(angleText(random))})`,
      () => '-1',
      () => '(1 + 2i)',
    ],
    random,
  )(random);
}

function bracketed(text: string): string {
  return `(${text})`;
}

function axisText(random: Random, depth: number): string {
  const part = (): string => pick(['1', '-1', '0.5', String(random()), '√2', '-2/3'], random);
  return pick(
    [
      () => pick(['x', 'y', 'z', '-x', '-z'], random),
      () => `[${part()}, ${part()}, ${part()}]`,
      () => stateText(random, depth - 1),
    ],
    random,
  )();
}

/** A matrix of a random unitary with a random factor, every digit of it. */
function matrixText(random: Random): string {
  const [a, b, share, size] = [random() * 7, random() * 7, random(), 0.1 + 3 * random()];
  const [p, q] = [size * Math.sqrt(share), size * Math.sqrt(1 - share)];
  const entry = (re: number, im: number): string => `${re} ${im < 0 ? '-' : '+'} ${Math.abs(im)}i`;
  const top = [entry(p * Math.cos(a), p * Math.sin(a)), entry(q * Math.cos(b), q * Math.sin(b))];
  const bottom = [entry(-q * Math.cos(b), q * Math.sin(b)), entry(p * Math.cos(a), -p * Math.sin(a))];
  return `matrix [[${top.join(', ')}], [${bottom.join(', ')}]]`;
}

export function plateText(random: Random): string {
  const kind = random();
  if (kind < 0.4) return `qwp(${angleText(random)})`;
  return kind < 0.8 ? `hwp(${angleText(random)})` : `plate(${angleText(random)}, ${angleText(random)})`;
}

function pauliSum(random: Random): string {
  return `(${plain(random)} X ${pick(['+', '-'], random)} ${plain(random)} Y + ${pick(['Z', 'hadamard', '0.3 Z'], random)})`;
}

/** A unitary up to a factor. */
export function unitaryText(random: Random, depth: number): string {
  const leaf: readonly (() => string)[] = [
    () =>
      pick(
        ['X', 'Y', 'Z', 'S', 'T', 'identity', 'hadamard', 'sqrtX', 'sqrtY', 'sqrtZ', '√X', 'sqrt(Y)'],
        random,
      ),
    () => plateText(random),
    () => `zyz(${angleText(random)}, ${angleText(random)}, ${angleText(random)})`,
    () => matrixText(random),
    () => `exp(${pick(['-', '', '+'], random)}i ${bracketed(angleText(random))} ${pauliSum(random)})`,
    () => `e^(i pi/${Math.ceil(random() * 9)} ${pauliSum(random)})`,
    () => `(cos(${angleText(random)}) identity - 0.7 i ${pick(['X', 'Y', 'Z', 'hadamard'], random)})`,
  ];
  if (depth <= 0) return pick(leaf, random)();
  const inner = (): string => bracketed(unitaryText(random, depth - 1));
  const more: readonly (() => string)[] = [
    () => `rotate(${axisText(random, depth)}, ${angleText(random)})`,
    () => `from ${stateText(random, depth - 1)} to ${stateText(random, depth - 1)}`,
    () => `${inner()}${pick(['·', '*', ' ', ' * '], random)}${inner()}`,
    () => `${inner()}${pick(['†', ' dagger', '^†', '^dagger', '††'], random)}`,
    () => `dagger(${unitaryText(random, depth - 1)})`,
    () => `${inner()}^${pick(['2', '-1', '3', '0', '(-2)'], random)}`,
    () => `${scalar(random)} ${inner()}`,
    () => `-${inner()}/${bracketed(scalar(random))}`,
    () =>
      Array.from({ length: 2 + Math.floor(random() * 4) }, () => plateText(random)).join(
        pick([' ', '*', '·'], random),
      ),
    () => `(X ${pick(['+', '-'], random)} ${pick(['Y', 'Z', '2 Z', '1/2 Y + Z'], random)})/${plain(random)}`,
    () => pick(leaf, random)(),
  ];
  return pick(more, random)();
}

/** A state that is hardly ever nothing. */
export function stateText(random: Random, depth: number): string {
  const leaf: readonly (() => string)[] = [
    () => pick(['H', 'V', 'D', 'A', 'L', 'R', '|0>', '|1⟩', '|+>', '|−>', '|+i>', '|-i⟩'], random),
    () => `bloch(${angleText(random)}, ${angleText(random)})`,
    () => `ellipse(${angleText(random)}, ${Math.round((random() * 2 - 1) * 450) / 10}deg)`,
    () => `linear(${angleText(random)})`,
    () => `[${plain(random)}, ${scalar(random)}]`,
    () => 'stokes(0.6, 0, 0.8)',
  ];
  if (depth <= 0) return pick(leaf, random)();
  const inner = (): string => bracketed(stateText(random, depth - 1));
  return pick(
    [
      ...leaf,
      () => `${scalar(random)}${pick([' ', '*', '·'], random)}${inner()}`,
      () => `${inner()} ${pick(['+', '-', '−'], random)} ${scalar(random)} ${inner()}`,
      () => `-${inner()}/${bracketed(scalar(random))}`,
      () => `${bracketed(unitaryText(random, depth - 1))} ${inner()}`,
      () => `${plateText(random)} ${plateText(random)} ${inner()}`,
    ],
    random,
  )();
}

/**
 * A repeatable stream of numbers evenly spread over [0, 1), the same on every engine: whole numbers of 32 bits only.
 * The n-th word is a counter, n times the odd number nearest 2³²/φ, taken through two rounds of xor-shift and multiplication,
 * so that one bit of the seed reaches all; two words make the 53 bits of a double. For drawing states to measure and errors to
 * add up, not for secrets.
 */
export function seededStream(seed: number): () => number {
  // The seed's two halves, so that whole numbers up to 2⁵³ give different streams.
  let counter = mixed((seed >>> 0) ^ mixed(Math.floor(Math.abs(seed) / 4_294_967_296) + 0x51ed270b));
  const word = (): number => {
    counter = (counter + 0x9e3779b9) >>> 0;
    return mixed(counter);
  };
  return () => {
    const high = word() >>> 5;
    const low = word() >>> 6;
    return (high * 67_108_864 + low) / 9_007_199_254_740_992;
  };
}

function mixed(value: number): number {
  let x = value >>> 0;
  x = Math.imul(x ^ (x >>> 16), 0x21f0aaad);
  x = Math.imul(x ^ (x >>> 15), 0xd35a2d97);
  return (x ^ (x >>> 15)) >>> 0;
}

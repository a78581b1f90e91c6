/** "412.3°". */
export function turnWords(deg: number): string {
  return `${deg.toFixed(1).replace('-', '\u2212')}°`;
}

/** "48 s", "3 min 20 s". */
export function durationWords(seconds: number): string {
  const whole = Math.round(seconds);
  if (Math.abs(whole) < 60) return `${whole} s`;
  const minutes = Math.trunc(whole / 60);
  const rest = Math.abs(whole % 60);
  return rest === 0 ? `${minutes} min` : `${minutes} min ${rest} s`;
}

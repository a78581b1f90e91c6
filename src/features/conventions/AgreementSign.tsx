/** Two lines that meet where a convention writes what was typed, two that miss where it does not. Its word stands beside it. */
export function AgreementSign({ agrees }: { readonly agrees: boolean }) {
  return (
    <svg
      aria-hidden="true"
      width="12"
      height="14"
      viewBox="-6 -7 12 14"
      fill="none"
      className="mr-1 inline-block shrink-0 align-[-0.1em] stroke-ink"
    >
      <path d="M-6 0H6" strokeWidth="0.9" />
      <path d={agrees ? 'M0 -6.5V6.5' : 'M-2.5 -6.5V0M2.5 0V6.5'} strokeWidth={agrees ? 1.4 : 2} />
    </svg>
  );
}

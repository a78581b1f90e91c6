import type { SeenMove } from '../../components/dial-words';

/** Three quarters of a turn with one arrowhead; the words beside it say the same. */
export function TurnSign({ sense }: { readonly sense: SeenMove['sense'] }) {
  return (
    <svg
      viewBox="-20 -20 45 40"
      width="45"
      height="40"
      aria-hidden="true"
      // Drawn clockwise; the mirror image is the other way round.
      transform={sense === 'counter-clockwise' ? 'scale(-1 1)' : undefined}
    >
      <path d="M-16 10A17 17 0 1 1 15.5 1" fill="none" stroke="currentColor" strokeWidth="4.4" />
      <path d="M6 2H24L16.5 15Z" fill="currentColor" />
    </svg>
  );
}

import type { runStates } from '../schemas/runs';

export type RunState = (typeof runStates)[number];

export type RunEvent =
  | { readonly kind: 'record' }
  | { readonly kind: 'pause' }
  | { readonly kind: 'resume' }
  /** `open`: settings that are neither done nor skipped. */
  | { readonly kind: 'finish'; readonly open: number };

type Transition =
  { readonly ok: true; readonly state: RunState } | { readonly ok: false; readonly reason: string };

const to = (state: RunState): Transition => ({ ok: true, state });
const not = (reason: string): Transition => ({ ok: false, reason });

/** The life of a run: what may happen to it in a state, and what it becomes. Server and buttons both ask this. */
export function transition(state: RunState, event: RunEvent): Transition {
  if (state === 'finished') return not('The run is finished, and stays as it is. Start another run.');
  switch (event.kind) {
    case 'record':
      return state === 'running' ? to('running') : not('The run is paused. Resume it, then record.');
    case 'pause':
      return state === 'running' ? to('paused') : not('The run is paused already.');
    case 'resume':
      return state === 'paused' ? to('running') : not('The run is not paused.');
    case 'finish':
      if (event.open === 0) return to('finished');
      return not(
        event.open === 1
          ? 'One setting is neither done nor skipped. Do it, or skip it with a reason.'
          : `${event.open} settings are neither done nor skipped. Do them, or skip each with a reason.`,
      );
  }
}

import { useEffect, useRef } from 'react';
import { beamStations, sideStations, type StationTargets } from './beam-stations';

const waitMs = 1_500;

/** Single letters act only outside fields: what someone types is theirs. */
export function isTyping(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable ||
      target.closest('input, textarea, select, [role="slider"], [role="textbox"]') !== null)
  );
}

/** `g` then `p r b s c l q` goes to a station, `g h` home. `enabled` false switches the letters off. */
export function useGoKeys(
  targets: StationTargets,
  homeHref: string,
  go: (href: string) => void,
  enabled: boolean,
): void {
  const latest = useRef({ targets, homeHref, go });
  useEffect(() => {
    latest.current = { targets, homeHref, go };
  });
  useEffect(() => {
    if (!enabled) return;
    let armedAt = Number.NEGATIVE_INFINITY;
    const press = (event: KeyboardEvent): void => {
      if (event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return;
      if (document.querySelector('dialog[open]') !== null) return;
      if (event.key === 'g') {
        armedAt = event.timeStamp;
        return;
      }
      if (event.timeStamp - armedAt > waitMs) return;
      armedAt = Number.NEGATIVE_INFINITY;
      const station = [...beamStations, ...sideStations].find(({ goKey }) => goKey === event.key);
      const { targets: now, homeHref: home, go: follow } = latest.current;
      const href = event.key === 'h' ? home : station === undefined ? undefined : now[station.key]?.href;
      if (href === undefined) return;
      event.preventDefault();
      follow(href);
    };
    window.addEventListener('keydown', press);
    return () => {
      window.removeEventListener('keydown', press);
    };
  }, [enabled]);
}

import { useRef } from 'react';
import type { LampLevel } from '../app/appearance';
import { useTheme } from '../app/theme';
import { classNames } from './class-names';

const levels: readonly { readonly level: LampLevel; readonly name: string; readonly radius: number }[] = [
  { level: 'low', name: 'low', radius: 6 },
  { level: 'mid', name: 'middle', radius: 8.8 },
  { level: 'high', name: 'high', radius: 11 },
];

const longPressMs = 600;

/**
 * Three discs that set the dark room's ink to 60, 100 or 140 %. A long press on any of them changes to red ink and back, for
 * detectors that see amber; the same is a switch with words, `LampInkSwitch`, since nothing may need a long press.
 */
export function Lamp() {
  const { lamp, lampInk, setLamp, setLampInk } = useTheme();
  const pressed = useRef<number | undefined>(undefined);
  const stop = (): void => {
    window.clearTimeout(pressed.current);
  };
  return (
    <fieldset
      className="flex items-center"
      onPointerDown={() => {
        pressed.current = window.setTimeout(() => {
          setLampInk(lampInk === 'red' ? 'amber' : 'red');
        }, longPressMs);
      }}
      onPointerUp={stop}
      onPointerLeave={stop}
      onPointerCancel={stop}
    >
      <legend className="sr-only">Lamp: how bright the ink is</legend>
      <span aria-hidden="true" className="pr-2 text-ink-2">
        lamp
      </span>
      {levels.map(({ level, name, radius }) => (
        <label
          key={level}
          className="relative flex h-11 w-11 cursor-pointer items-center justify-center has-focus-visible:outline-3 has-focus-visible:outline-beam"
        >
          <input
            type="radio"
            name="lamp"
            value={level}
            checked={lamp === level}
            onChange={() => {
              setLamp(level);
            }}
            className="absolute inset-0 m-0 cursor-pointer appearance-none outline-none"
          />
          <span className="sr-only">{name}</span>
          <svg aria-hidden="true" viewBox="-12 -12 24 24" width="24" height="24">
            <circle
              r={radius}
              strokeWidth="1.4"
              className={classNames('stroke-act', lamp === level ? 'fill-act' : 'fill-none')}
            />
          </svg>
        </label>
      ))}
    </fieldset>
  );
}

/** The lamp's second choice in words. */
export function LampInkSwitch() {
  const { lampInk, setLampInk } = useTheme();
  return (
    <label className="flex min-h-11 cursor-pointer items-center gap-3">
      <input
        type="checkbox"
        className="size-5.5 appearance-none border border-ink bg-glass checked:border-[7px] checked:border-act"
        checked={lampInk === 'red'}
        onChange={(event) => {
          setLampInk(event.currentTarget.checked ? 'red' : 'amber');
        }}
      />
      red ink, for detectors that see amber
    </label>
  );
}

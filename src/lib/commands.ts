import { useEffect, useRef } from 'react';

/** What a key, a button and the list of keys share, so that they can't disagree. */
export interface Command {
  readonly id: string;
  /** A verb with its object, as the list of keys says it. */
  readonly label: string;
  /** As in `KeyboardEvent.key`, with modifiers before it: "Alt+ArrowUp", "Ctrl+z", "p". Any of them serves. */
  readonly keys: readonly string[];
  /** Absent: always. */
  readonly when?: () => boolean;
  readonly run: () => void;
}

const offKey = 'quarterturn.single-letter-keys';

/** Single letters can be switched off (WCAG 2.1.4). */
export function singleLettersAreOn(): boolean {
  return localStorage.getItem(offKey) !== 'off';
}

export function switchSingleLetters(on: boolean): void {
  localStorage.setItem(offKey, on ? 'on' : 'off');
}

/** Whether a key may be meant for the element itself. A choice by radio or checkbox takes arrows and Space, no letters. */
function keepsKey(target: EventTarget | null, key: string): boolean {
  if (target instanceof HTMLInputElement && ['radio', 'checkbox'].includes(target.type)) {
    return key === ' ' || key.startsWith('Arrow');
  }
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable || ['INPUT', 'TEXTAREA', 'SELECT'].includes(target.tagName))
  );
}

/** What Enter and Space already press. */
function isPressable(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest('button, a, summary, [role="button"]') !== null;
}

// The letter after `g` goes to a station (use-go-keys.ts): it is no command of the page.
const goPrefixMs = 1500;

/** "Ctrl+z" stands for the command key of a Mac as well. */
function nameOf(event: KeyboardEvent): string {
  const single = event.key.length === 1;
  const parts = [
    event.ctrlKey || event.metaKey ? 'Ctrl' : null,
    event.altKey ? 'Alt' : null,
    // A letter's case and a sign's shift are in the key itself.
    event.shiftKey && (!single || event.ctrlKey || event.metaKey) ? 'Shift' : null,
    single && (event.ctrlKey || event.metaKey) ? event.key.toLowerCase() : event.key,
  ];
  return parts.filter((part) => part !== null).join('+');
}

/** Runs the commands of a page on their keys while it is shown. Fields keep their keys, all but Ctrl combinations. */
export function useCommands(commands: readonly Command[]): void {
  const current = useRef(commands);
  useEffect(() => {
    current.current = commands;
  });
  useEffect(() => {
    let goPressedAt = Number.NEGATIVE_INFINITY;
    const listen = (event: KeyboardEvent) => {
      if (event.defaultPrevented || document.querySelector('dialog[open]') !== null) return;
      const name = nameOf(event);
      if (keepsKey(event.target, event.key) && !name.startsWith('Ctrl+')) return;
      if ((name === 'Enter' || name === ' ') && isPressable(event.target)) return;
      if (name.length === 1 && !singleLettersAreOn()) return;
      if (name.length === 1) {
        const goes = event.timeStamp - goPressedAt < goPrefixMs;
        goPressedAt = name === 'g' ? event.timeStamp : Number.NEGATIVE_INFINITY;
        if (goes) return;
      }
      const command = current.current.find(({ keys, when }) => keys.includes(name) && (when?.() ?? true));
      if (command === undefined) return;
      event.preventDefault();
      command.run();
    };
    document.addEventListener('keydown', listen);
    return () => document.removeEventListener('keydown', listen);
  }, []);
}

import type { Response } from 'express';

/** The answers that can be made to go wrong. */
export const FAULTY_ENDPOINTS = ['token', 'user', 'emails'] as const;
export type FaultyEndpoint = (typeof FAULTY_ENDPOINTS)[number];

/**
 * What a provider was seen or feared to do: never answer, answer a web page, fail, redirect; for `emails` an empty list
 * or an address that was never verified; for `user` another account that carries the same e-mail address.
 */
export const FAULTS = [
  'hang',
  'html',
  'error500',
  'redirect',
  'emptyEmails',
  'unverifiedEmail',
  'otherId',
] as const;
export type Fault = (typeof FAULTS)[number];

export interface Faults {
  readonly set: (endpoint: FaultyEndpoint, fault: Fault) => void;
  readonly clear: () => void;
  readonly of: (endpoint: FaultyEndpoint) => Fault | undefined;
}

export function createFaults(): Faults {
  const chosen = new Map<FaultyEndpoint, Fault>();
  return {
    set: (endpoint, fault) => {
      chosen.set(endpoint, fault);
    },
    clear: () => chosen.clear(),
    of: (endpoint) => chosen.get(endpoint),
  };
}

export function isFaultyEndpoint(text: string): text is FaultyEndpoint {
  return FAULTY_ENDPOINTS.some((one) => one === text);
}

export function isFault(text: string): text is Fault {
  return FAULTS.some((one) => one === text);
}

/** Reads faults chosen for a whole process, written as `token:hang,emails:html`. Throws on a word it does not know. */
export function setFaultsFromText(faults: Faults, text: string): void {
  for (const pair of text.split(',').filter((one) => one !== '')) {
    const [endpoint = '', fault = ''] = pair.split(':');
    if (!isFaultyEndpoint(endpoint) || !isFault(fault)) {
      throw new Error(
        `"${pair}" is no fault: write endpoint:fault with one of ${FAULTY_ENDPOINTS.join(', ')} and one of ${FAULTS.join(', ')}.`,
      );
    }
    faults.set(endpoint, fault);
  }
}

/** Gives the faulty answer when the fault replaces the whole answer; false when the endpoint goes on (and may bend its content). */
export function answeredFaulty(fault: Fault | undefined, response: Response): boolean {
  switch (fault) {
    case 'hang':
      return true;
    case 'html':
      response
        .type('html')
        .send('<!doctype html><title>Unicorn!</title><p>This page is taking too long to load.');
      return true;
    case 'error500':
      response.status(500).json({ message: 'Server Error' });
      return true;
    case 'redirect':
      response.redirect(302, '/elsewhere');
      return true;
    default:
      return false;
  }
}

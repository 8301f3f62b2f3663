import type { RefObject } from 'react';

import { FieldBurst } from './field-burst';
import { HeldKeys } from './held-keys';
import { isBare, isField, isModifier, nameOf } from './key-names';

/** One key of a screen: what it is called on the key line and what it does. */
export interface ScreenKey {
  /** As it is shown: `N`, `Ctrl Enter`, `Space`, `[`. */
  key: string;
  says: string;
  act(): void;
  /** Works inside a field too (Ctrl Enter, Esc). */
  inFields?: boolean;
}

/** What the band does for keys: go to a flap, pick up, show all keys. */
export interface BandActs {
  go(letter: string): void;
  focusPickUp(): void;
  pickUpScan(text: string): void;
  showAll(): void;
}

/** The newest of what keys do; kept by the provider. */
interface KeysNow {
  acts: RefObject<BandActs>;
  keys: RefObject<readonly ScreenKey[]>;
  scan: RefObject<((text: string) => void) | null>;
}

const GO_WITHIN_MS = 1500;

/** Single-letter keys can be switched off in the menu at the right of the band. */
export const lettersAreOn = () => localStorage.getItem('foldwell letters') !== 'off';

/** Listens to the keyboard of the whole page until the returned function is called. */
export function listenToKeys(now: KeysNow): () => void {
  const held = new HeldKeys(charactersOf(now));
  const burst = new FieldBurst((text) => now.scan.current?.(text));
  const onCapture = (event: KeyboardEvent) => {
    if (now.scan.current && !isDialogOpen()) burst.note(event);
  };
  const onKey = (event: KeyboardEvent) => {
    if (event.isComposing || event.defaultPrevented || isModifier(event) || isDialogOpen()) return;
    if (!isField(event.target) && isBare(event) && held.takes(event.key)) {
      event.preventDefault();
      return;
    }
    const code = held.endedBy(nameOf(event));
    if (code === null) actOn(event, now.keys.current);
    else {
      event.preventDefault();
      (now.scan.current ?? now.acts.current.pickUpScan)(code);
    }
  };
  window.addEventListener('keydown', onCapture, true);
  window.addEventListener('keydown', onKey);
  return () => {
    held.drop();
    window.removeEventListener('keydown', onCapture, true);
    window.removeEventListener('keydown', onKey);
  };
}

/** A paper over the veil has its own keys; those of the sheet under it rest. */
const isDialogOpen = () => document.querySelector('dialog[open]') !== null;

/** What a single character does: a flap after G, a key of the band, a key of the screen. */
function charactersOf({ acts, keys }: KeysNow): (character: string) => void {
  let goesAt = 0;
  return (character) => {
    const name = character.toUpperCase();
    const isAfterG = Date.now() - goesAt < GO_WITHIN_MS;
    goesAt = 0;
    if (!lettersAreOn()) return;
    if (isAfterG && /^[A-Z]$/.test(name)) acts.current.go(name);
    else if (name === 'G') goesAt = Date.now();
    else if (name === '/') acts.current.focusPickUp();
    else if (name === '?') acts.current.showAll();
    else keys.current.find((one) => one.key === name)?.act();
  };
}

/** Does what the open screen has for this key, unless the control in focus has its own use of it. */
function actOn(event: KeyboardEvent, keys: readonly ScreenKey[]): void {
  const name = nameOf(event);
  const isTyping = isField(event.target);
  if (isTyping && name === 'Esc') (event.target as HTMLElement).blur();
  const found = keys.find((one) => one.key === name && (!isTyping || one.inFields));
  if (!found) return;
  if (event.target instanceof HTMLButtonElement && (name === 'Enter' || name === 'Space')) return;
  if (event.target instanceof HTMLAnchorElement && name === 'Enter') return;
  event.preventDefault();
  found.act();
}

const NAMES: Record<string, string> = {
  ' ': 'Space',
  Escape: 'Esc',
  ArrowUp: '↑',
  ArrowDown: '↓',
  Delete: 'Del',
  PageUp: 'PgUp',
  PageDown: 'PgDn',
};
const ALONE = new Set(['Shift', 'Control', 'Alt', 'Meta', 'AltGraph', 'CapsLock']);

/** A key as it is shown on the key line: `N`, `Ctrl Enter`, `↓`. */
export function nameOf(event: KeyboardEvent): string {
  const name = NAMES[event.key] ?? (event.key.length === 1 ? event.key.toUpperCase() : event.key);
  return event.ctrlKey || event.metaKey ? `Ctrl ${name}` : name;
}

/** Whether no key is held beside it but Shift, which is part of the character. */
export function isBare(event: KeyboardEvent): boolean {
  return !event.ctrlKey && !event.metaKey && !event.altKey;
}

/** Shift and its like by themselves; a scanner sends them between its characters. */
export function isModifier(event: KeyboardEvent): boolean {
  return ALONE.has(event.key);
}

export type TextField = HTMLInputElement | HTMLTextAreaElement | HTMLSelectElement;

/** Whether keys are typing there. */
export function isField(target: EventTarget | null): target is TextField {
  return target instanceof HTMLElement && target.matches('input, textarea, select');
}

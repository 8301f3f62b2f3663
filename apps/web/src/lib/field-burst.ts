import { SCAN_GAP_MS, SCAN_LEAST } from './held-keys';
import { isBare, isField, isModifier, type TextField } from './key-names';

/**
 * A scan while another field has the focus: the field gets back what it held, the code goes where
 * codes go. Fields marked `data-scans` take codes themselves; a reading with a decimal mark comes from
 * a balance that types, and stays.
 */
export class FieldBurst {
  private field: TextField | null = null;
  private before = '';
  private text = '';
  private at = 0;

  constructor(private readonly deliver: (code: string) => void) {}

  /** Sees each key before its field does. */
  note(event: KeyboardEvent): void {
    const { target } = event;
    if (isModifier(event)) return;
    const isLate = event.timeStamp - this.at > SCAN_GAP_MS;
    this.at = event.timeStamp;
    if (!isBare(event) || !isField(target) || !takesBursts(target)) this.begin(null);
    else if (event.key === 'Enter') this.end(event, isLate);
    else if (event.key.length !== 1) this.begin(null);
    else {
      if (isLate || target !== this.field) this.begin(target);
      this.text += event.key;
    }
  }

  private begin(field: TextField | null): void {
    this.field = field;
    this.before = field?.value ?? '';
    this.text = '';
  }

  private end(event: KeyboardEvent, isLate: boolean): void {
    const { field, text, before } = this;
    this.begin(null);
    if (!field || field !== event.target || isLate || text.length < SCAN_LEAST) return;
    if (field.inputMode === 'decimal' && /[.,]/.test(text)) return;
    event.preventDefault();
    event.stopPropagation();
    putBack(field, before);
    this.deliver(text);
  }
}

function takesBursts(field: TextField): boolean {
  return field.dataset.scans === undefined && field.type !== 'password';
}

/** As if typed, so that the form that holds the value hears of it. */
function putBack(field: TextField, value: string): void {
  const prototype = Object.getPrototypeOf(field) as object;
  Object.getOwnPropertyDescriptor(prototype, 'value')?.set?.call(field, value);
  const name = field instanceof HTMLSelectElement ? 'change' : 'input';
  field.dispatchEvent(new Event(name, { bubbles: true }));
}

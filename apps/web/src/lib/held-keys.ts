/** A scanner leaves less than this between two characters; nobody types so fast. */
export const SCAN_GAP_MS = 35;
/** Fewer characters than this are keys, not a code. */
export const SCAN_LEAST = 3;

/**
 * Characters that came outside a field, held until it is sure whether a scanner sent them: the digits
 * of a code must never press the answers of a screen.
 */
export class HeldKeys {
  private text = '';
  private timer = 0;

  /** `press` is told each character that nobody scanned. */
  constructor(private readonly press: (character: string) => void) {}

  /** Holds a character; false for what is a key of its own: Enter, arrows, a space that begins nothing. */
  takes(key: string): boolean {
    if (key.length !== 1 || (key === ' ' && this.text === '')) return false;
    this.text += key;
    window.clearTimeout(this.timer);
    this.timer = window.setTimeout(() => this.release(), SCAN_GAP_MS);
    return true;
  }

  /** The code that this key ends; null where it ends none, and what was held is pressed first. */
  endedBy(key: string): string | null {
    const { text } = this;
    if (key !== 'Enter' || text.length < SCAN_LEAST) {
      this.release();
      return null;
    }
    this.drop();
    return text;
  }

  drop(): void {
    window.clearTimeout(this.timer);
    this.text = '';
  }

  /** A code that lost its Enter presses nothing. */
  private release(): void {
    const { text } = this;
    this.drop();
    if (text.length < SCAN_LEAST) for (const character of text) this.press(character);
  }
}

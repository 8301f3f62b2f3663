import {
  createContext,
  type ReactNode,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useRef,
  useState,
} from 'react';

/** One key of a screen: what it is called on the key line and what it does. */
export interface ScreenKey {
  /** As it is shown: `N`, `Ctrl Enter`, `Space`, `[`. */
  key: string;
  says: string;
  act(): void;
  /** Works inside a field too (Ctrl Enter, Esc). */
  inFields?: boolean;
}

interface Keys {
  shown: ScreenKey[];
  state: string;
  setKeys(keys: ScreenKey[]): void;
  setState(state: string): void;
  setScan(take: ((text: string) => void) | null): void;
}

const KeysContext = createContext<Keys | null>(null);
const SCAN_GAP_MS = 35;
const SCAN_LEAST = 3;

/** What the band does for keys: go to a flap, pick up, show all keys. */
export interface BandActs {
  go(letter: string): void;
  focusPickUp(): void;
  pickUpScan(text: string): void;
  showAll(): void;
}

/** Keeps the keys of the screen that is open, the state at the right of the key line, and the scanner. */
export function KeysProvider({ children, ...acts }: BandActs & { children: ReactNode }) {
  const [shown, setKeys] = useState<ScreenKey[]>([]);
  const [state, setState] = useState('');
  const onScan = useRef<((text: string) => void) | null>(null);
  const setScan = useCallback((take: ((text: string) => void) | null) => {
    onScan.current = take;
  }, []);
  const latest = useRef({ shown, ...acts });
  latest.current = { shown, ...acts };
  useEffect(() => listen(latest, onScan), []);
  const value = useMemo(
    () => ({ shown, state, setKeys, setState, setScan }),
    [shown, state, setScan],
  );
  return <KeysContext value={value}>{children}</KeysContext>;
}

type Scan = React.RefObject<((text: string) => void) | null>;
type Latest = React.RefObject<BandActs & { shown: ScreenKey[] }>;

function listen(latest: Latest, onScan: Scan): () => void {
  let goesAt = 0;
  const burst = { text: '', at: 0 };
  const onKey = (event: KeyboardEvent) => {
    if (event.isComposing || event.defaultPrevented) return;
    if (tookScan(event, burst, onScan, latest)) return;
    const isField =
      event.target instanceof HTMLElement &&
      event.target.matches('input, textarea, select, [contenteditable]');
    const name = nameOf(event);
    if (isField && name === 'Esc') event.target.blur();
    const isPlain = !event.ctrlKey && !event.metaKey && !event.altKey;
    if (!isField && isPlain && Date.now() - goesAt < 1500 && /^[A-Z]$/.test(name)) {
      goesAt = 0;
      event.preventDefault();
      latest.current.go(name);
      return;
    }
    if (!isField && isPlain && lettersAreOn()) {
      if (name === 'G') {
        goesAt = Date.now();
        return;
      }
      const acts = { '/': latest.current.focusPickUp, '?': latest.current.showAll };
      if (name === '/' || name === '?') {
        event.preventDefault();
        acts[name]();
        return;
      }
    }
    actOn(event, name, isField, latest.current.shown);
  };
  window.addEventListener('keydown', onKey);
  return () => window.removeEventListener('keydown', onKey);
}

/** Does what the open screen has for this key, unless the control in focus has its own use of it. */
function actOn(event: KeyboardEvent, name: string, isField: boolean, shown: ScreenKey[]): void {
  const found = shown.find((one) => one.key === name && (!isField || one.inFields));
  if (!found || (/^[A-Z]$/.test(name) && !lettersAreOn())) return;
  if (event.target instanceof HTMLButtonElement && (name === 'Enter' || name === 'Space')) return;
  if (event.target instanceof HTMLAnchorElement && name === 'Enter') return;
  event.preventDefault();
  found.act();
}

/** A burst of characters ending in Enter is the scanner: to the screen's scan line, or else to Pick up. */
function tookScan(
  event: KeyboardEvent,
  burst: { text: string; at: number },
  onScan: Scan,
  latest: Latest,
): boolean {
  const isField =
    event.target instanceof HTMLElement && event.target.matches('input, textarea, select');
  if (isField || event.ctrlKey || event.metaKey || event.altKey) {
    burst.text = '';
    return false;
  }
  const now = performance.now();
  if (now - burst.at > SCAN_GAP_MS) burst.text = '';
  burst.at = now;
  if (event.key.length === 1) {
    burst.text += event.key;
    return burst.text.length >= SCAN_LEAST;
  }
  if (event.key !== 'Enter' || burst.text.length < SCAN_LEAST) return false;
  const text = burst.text;
  burst.text = '';
  event.preventDefault();
  (onScan.current ?? latest.current.pickUpScan)(text);
  return true;
}

function nameOf(event: KeyboardEvent): string {
  const names: Record<string, string> = {
    ' ': 'Space',
    Escape: 'Esc',
    ArrowUp: '↑',
    ArrowDown: '↓',
    Delete: 'Del',
    PageUp: 'PgUp',
    PageDown: 'PgDn',
  };
  const name = names[event.key] ?? (event.key.length === 1 ? event.key.toUpperCase() : event.key);
  return event.ctrlKey || event.metaKey ? `Ctrl ${name}` : name;
}

/** Single-letter keys can be switched off in the menu at the right of the band. */
export const lettersAreOn = () => localStorage.getItem('foldwell letters') !== 'off';

/** Sets the keys of this screen while it is open. */
export function useKeys(keys: ScreenKey[], state = ''): void {
  const context = useContext(KeysContext);
  const latest = useRef(keys);
  latest.current = keys;
  const setKeys = context?.setKeys;
  const setState = context?.setState;
  // Told again only when a key or its word changes; what it does is always the newest.
  const told = JSON.stringify(keys.map(({ key, says, inFields }) => ({ key, says, inFields })));
  useEffect(() => {
    const named = JSON.parse(told) as Omit<ScreenKey, 'act'>[];
    setKeys?.(named.map((key, index) => ({ ...key, act: () => latest.current[index]?.act() })));
    return () => setKeys?.([]);
  }, [told, setKeys]);
  useEffect(() => {
    setState?.(state);
  }, [state, setState]);
}

/** Sends scans to this screen's own line while it is open. */
export function useScanner(take: (text: string) => void): void {
  const context = useContext(KeysContext);
  const latest = useRef(take);
  latest.current = take;
  const setScan = context?.setScan;
  useEffect(() => {
    setScan?.((text) => latest.current(text));
    return () => setScan?.(null);
  }, [setScan]);
}

/** The key line at the foot: keys left, saved state right. */
export function KeyLine() {
  const context = useContext(KeysContext);
  return (
    <footer className="key-line">
      {context?.shown
        .filter(({ says }) => says !== '')
        .map(({ key, says }) => (
          <span key={key + says}>
            <kbd>{key}</kbd>
            {says}
          </span>
        ))}
      <span>
        <kbd>G then a letter</kbd>go to
      </span>
      <span>
        <kbd>?</kbd>all keys
      </span>
      <span className="grow" />
      <span role="status">{context?.state}</span>
    </footer>
  );
}

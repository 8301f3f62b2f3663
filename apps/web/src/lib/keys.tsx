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

import { type BandActs, listenToKeys, type ScreenKey } from './key-listener';

/** Keys and state of one sheet or of a part that is open on it; a part is made later than its sheet. */
interface Layer {
  id: number;
  keys: ScreenKey[];
  state: string;
}

interface Keys {
  layers: readonly Layer[];
  lay(layer: Layer): void;
  lift(id: number): void;
  setScan(take: ((text: string) => void) | null): void;
}

let layersMade = 0;

/** The keys of all layers; a part's key stands in for the same key of its sheet. */
function topmost(layers: readonly Layer[]): ScreenKey[] {
  const keys = layers.flatMap((layer) => layer.keys);
  return [...new Map(keys.map((key) => [key.key, key])).values()];
}

const KeysContext = createContext<Keys | null>(null);

/** Keeps the keys of the sheet that is open and of what is open on it, and the scanner. */
export function KeysProvider({ children, ...acts }: BandActs & { children: ReactNode }) {
  const [layers, setLayers] = useState<readonly Layer[]>([]);
  const lay = useCallback(
    (layer: Layer) =>
      setLayers((was) =>
        [...was.filter(({ id }) => id !== layer.id), layer].sort((a, b) => a.id - b.id),
      ),
    [],
  );
  const lift = useCallback(
    (id: number) => setLayers((was) => was.filter((one) => one.id !== id)),
    [],
  );
  const scan = useRef<((text: string) => void) | null>(null);
  const setScan = useCallback((take: ((text: string) => void) | null) => {
    scan.current = take;
  }, []);
  const newest = useRef<BandActs>(acts);
  newest.current = acts;
  const keys = useRef<ScreenKey[]>([]);
  keys.current = topmost(layers);
  useEffect(() => listenToKeys({ acts: newest, keys, scan }), []);
  const value = useMemo(() => ({ layers, lay, lift, setScan }), [layers, lay, lift, setScan]);
  return <KeysContext value={value}>{children}</KeysContext>;
}

/**
 * Keys of a sheet, or of a part of it, while it is open; `state` stands at the right of the key line.
 * A part's key goes before the same key of its sheet.
 */
export function useKeys(keys: ScreenKey[], state = ''): void {
  const context = useContext(KeysContext);
  // Counted while rendering, where a sheet comes before its parts; effects run the other way round.
  const [id] = useState(() => (layersMade += 1));
  const latest = useRef(keys);
  latest.current = keys;
  const lay = context?.lay;
  const lift = context?.lift;
  // Told again only when a key, its word or the state changes; what it does is always the newest.
  const told = JSON.stringify(keys.map(({ key, says, inFields }) => ({ key, says, inFields })));
  useEffect(() => {
    const named = JSON.parse(told) as Omit<ScreenKey, 'act'>[];
    const bound = named.map((key, index) => ({
      ...key,
      act: () => latest.current[index]?.act(),
    }));
    lay?.({ id, keys: bound, state });
  }, [id, told, state, lay]);
  useEffect(() => () => lift?.(id), [id, lift]);
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
  const layers = useContext(KeysContext)?.layers ?? [];
  return (
    <footer className="key-line">
      {topmost(layers)
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
      <span role="status">{layers.findLast(({ state }) => state !== '')?.state}</span>
    </footer>
  );
}

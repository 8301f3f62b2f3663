/** What a place needs to be said: its kind, names and whose memo it is. */
export interface PlaceNames {
  kind: string;
  name: string;
  safe: string;
  memo?: string | null;
  party?: string | null;
}

/** A place as people say it: `Safe B7`, `With I. Tarn`, `M 20614 Halvik Rings`. */
export function placeWords({ kind, name, safe, memo, party }: PlaceNames): string {
  switch (kind) {
    case 'drawer':
      return `Safe ${safe}${name}`;
    case 'show':
      return `Show ${name}`;
    case 'person':
      return `With ${name}`;
    case 'memo':
      return `M ${memo} ${party}`;
    case 'kept':
      return `Kept by ${party}, M ${memo}`;
    default:
      return name;
  }
}

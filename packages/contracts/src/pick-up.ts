/** One thing the field in the band found; `path` is where it opens. */
export interface PickUpHit {
  kind: 'lot' | 'memo' | 'customer';
  number: string;
  words: string;
  path: string;
  tone: 'plain' | 'late' | 'differs';
}

export interface PickUpAnswer {
  hits: PickUpHit[];
  /** Where an exact scan opens at once. */
  opens: string | null;
}

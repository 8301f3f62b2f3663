import type { Posting } from './leg.js';

/** The mirror image of a movement, posting by posting, at its own costs. */
export function reversalOf(postings: Posting[]): Posting[] {
  return postings.map((posting) => ({
    ...posting,
    weight: -posting.weight || 0,
    pieces: -posting.pieces || 0,
    cost: -posting.cost || 0,
  }));
}

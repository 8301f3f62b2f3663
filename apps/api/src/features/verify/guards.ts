/** The guards as the migrations make them; written by `npm run guards`, compared by verify and by a test. */
export const guards: string[] = [];

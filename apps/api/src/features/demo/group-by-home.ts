/** Lines by the drawer where the rest of their lot lies, so that a parcel comes together again. */
export function groupByHome<T extends { home: string | null }>(lines: T[]): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const line of lines)
    groups.set(line.home ?? '', [...(groups.get(line.home ?? '') ?? []), line]);
  return groups;
}

/** What a party owes or holds, minor units of its currency. */
export interface Exposure {
  onMemo: number;
  kept: number;
  total: number;
  limit: number | null;
  memoLimit: number | null;
  currency: string;
}

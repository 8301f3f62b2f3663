/** One thing that must hold on live data: the query names the offenders, none is right. */
export interface Assertion {
  says: string;
  offenders: string;
  /** Listed, but never a failure. */
  isWarning?: boolean;
  /** Asked of `guards_now`, with the list as it was written for $1. */
  usesGuards?: boolean;
}

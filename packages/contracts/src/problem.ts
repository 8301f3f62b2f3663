/** One field and what is wrong with it, in words. */
export interface FieldProblem {
  field: string;
  message: string;
}

/** An error as RFC 9457 problem details; `code` is stable, `title` and `detail` are for people. */
export interface ProblemBody {
  type: string;
  title: string;
  status: number;
  detail: string;
  instance: string;
  code: string;
  fields?: FieldProblem[];
  [extension: string]: unknown;
}

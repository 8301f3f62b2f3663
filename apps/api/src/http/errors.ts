import type { FieldProblem } from '@foldwell/contracts';

/** An answer that isn't a success, in words for people; `code` is the stable word for programs. */
export class Refusal extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    readonly sentence: string,
    readonly extra: Record<string, unknown> = {},
  ) {
    super(sentence);
  }
}

/** A rule of the house says no; the person can act on the sentence. */
export class RuleBroken extends Refusal {
  constructor(code: string, sentence: string, extra: Record<string, unknown> = {}) {
    super(409, code, sentence, extra);
  }
}

/** There is no such thing, or none this person may see. */
export class NotFound extends Refusal {
  constructor(sentence: string) {
    super(404, 'not_found', sentence);
  }
}

/** What was sent can't be read; one sentence for each field. */
export class ValidationFailed extends Refusal {
  constructor(readonly fields: FieldProblem[]) {
    super(400, 'fields', fields[0]?.message ?? 'Something in the form is not right.', { fields });
  }
}

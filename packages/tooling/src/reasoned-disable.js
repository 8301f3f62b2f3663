/**
 * A disabled rule says why, after `--`.
 * @type {import('eslint').Rule.RuleModule}
 */
export const reasonedDisable = {
  meta: {
    type: 'problem',
    schema: [],
    messages: { bare: 'Say why this rule is off here, after "--".' },
  },
  create(context) {
    return {
      Program() {
        for (const comment of context.sourceCode.getAllComments()) {
          if (/^\s*eslint-disable/.test(comment.value) && !/ -- \S/.test(comment.value)) {
            context.report({ loc: comment.loc ?? { line: 1, column: 0 }, messageId: 'bare' });
          }
        }
      },
    };
  },
};

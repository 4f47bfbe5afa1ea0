import { z } from 'zod';
import { text } from './text.js';

const { issues } = text.server;

/** What a schema found, in our words; a sentence written into a schema itself goes before. */
export const schemaWords: z.core.$ZodErrorMap = (issue) => {
  const isMissing = issue.input === undefined || issue.input === null || issue.input === '';
  switch (issue.code) {
    case 'invalid_type':
      return isMissing ? issues.missing : issues.wrongType(issue.expected);
    case 'invalid_format':
      if (isMissing) return issues.missing;
      return issue.format === 'email' ? issues.email : issues.format;
    case 'invalid_value':
      return isMissing ? issues.missing : issues.oneOf(issue.values.map(String).join(', '));
    case 'too_small':
      if (issue.origin === 'string') return issue.minimum === 1 ? issues.missing : issues.tooShort(issue.minimum);
      if (issue.origin === 'array') return issues.tooFew(issue.minimum);
      return issue.inclusive ? issues.atLeast(issue.minimum) : issues.moreThan(issue.minimum);
    case 'too_big':
      if (issue.origin === 'string') return issues.tooLong(issue.maximum);
      if (issue.origin === 'array') return issues.tooMany(issue.maximum);
      return issue.inclusive ? issues.atMost(issue.maximum) : issues.lessThan(issue.maximum);
    case 'unrecognized_keys':
      return issues.unknownFields(issue.keys.join(', '));
    default:
      return issues.other;
  }
};

/** From then on every schema of this process speaks so. */
export function speakInOurWords(): void {
  z.config({ customError: schemaWords });
}

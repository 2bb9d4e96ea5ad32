import { z } from 'zod';

type RawIssue = Parameters<NonNullable<ReturnType<typeof z.config>['customError']>>[0];

/** Words people understand where a schema gives none of its own. */
function wordsFor(issue: RawIssue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      return missing(issue.input) ? 'Needed' : issue.expected === 'number' ? 'A number' : undefined;
    case 'invalid_value':
      return 'Choose one of these';
    case 'too_small':
      return issue.origin === 'number' || issue.origin === 'int'
        ? `At least ${String(issue.minimum)}`
        : undefined;
    case 'too_big':
      return issue.origin === 'number' || issue.origin === 'int'
        ? `At most ${String(issue.maximum)}`
        : undefined;
    case 'not_multiple_of':
      return `In steps of ${String(issue.divisor)}`;
    default:
      return undefined;
  }
}

function missing(input: unknown): boolean {
  return input === undefined || input === null || input === '';
}

z.config({ customError: wordsFor });

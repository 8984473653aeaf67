import type { z } from 'zod';

/**
 * Why a value was refused, in words that follow its path: `0 is below 1`.
 *
 * @param issue the schema's complaint; @param found the value as JSON, undefined when there is none.
 */
export function reasonOf(issue: z.core.$ZodIssue, found: string | undefined): string {
  const value = found ?? 'nothing';
  switch (issue.code) {
    case 'too_small':
      if (issue.origin === 'array') return `has fewer than ${String(issue.minimum)} entries`;
      return issue.inclusive === false ? `${value} is not above ${String(issue.minimum)}` : `${value} is below ${String(issue.minimum)}`;
    case 'too_big':
      return issue.origin === 'array' ? `has more than ${String(issue.maximum)} entries${issue.message.startsWith('Too big') ? '' : ` (${issue.message})`}` : `${value} is above ${String(issue.maximum)}`;
    case 'unrecognized_keys':
      return 'is not a setting this version knows; "evenglow recipe" lists them';
    case 'invalid_value':
      return `${value} is not one of ${issue.values.map(String).join(', ')}`;
    case 'invalid_union':
      // Entries told apart by one key: what is wrong is that key.
      return 'options' in issue && issue.options ? `${value} is not one of ${issue.options.map(String).join(', ')}` : `${value} is not valid`;
    case 'invalid_type':
      return issue.expected === 'int' ? `${value} is not a whole number` : `${value} is not ${/^[aeiou]/.test(issue.expected) ? 'an' : 'a'} ${issue.expected}`;
    default:
      return `${value} is not valid (${issue.message})`;
  }
}

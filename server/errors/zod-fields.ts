import type * as z from 'zod/mini';

type Issue = z.core.$ZodIssue;

/** A sentence for what the schemas leave to zod: the API's own callers see these, forms never do. */
function sentence(issue: Issue): string {
  if (issue.message && issue.message !== 'Invalid input') return issue.message;
  switch (issue.code) {
    case 'invalid_type':
      return issue.input === undefined ? 'This is missing.' : `This must be of the type ${issue.expected}.`;
    case 'invalid_value':
      return `Choose one of: ${issue.values.map(String).join(', ')}.`;
    case 'too_big':
      return `At most ${issue.maximum}.`;
    case 'too_small':
      return `At least ${issue.minimum}.`;
    default:
      return 'This cannot be taken as it is.';
  }
}

/** Field path ('groupVolts.1') → sentence; the first issue of a field counts. The whole body's path is ''. */
export function fieldsOf(error: z.core.$ZodError): Record<string, string> {
  const fields: Record<string, string> = {};
  for (const issue of error.issues) fields[issue.path.map(String).join('.')] ??= sentence(issue);
  return fields;
}

import type { Issue, Refusal, RefusalCode } from '@shared/schemas/refusal';

/**
 * Thrown inside the engine where a document cannot be calculated; `calculateMember` turns it into a value.
 * `issues` name the fields, in the words of the person who typed them.
 */
export class Refused extends Error {
  readonly code: RefusalCode;
  readonly issues: Issue[];

  constructor(code: RefusalCode, message: string, issues: Issue[]) {
    super(cut(message));
    this.name = 'Refused';
    this.code = code;
    this.issues = issues
      .slice(0, mostIssues)
      .map((issue) => ({ path: cut(issue.path), message: cut(issue.message) }));
    if (issues.length > mostIssues) {
      this.issues.push({
        path: '',
        message: `There are ${issues.length - mostIssues} more; mend these first.`,
      });
    }
  }

  toRefusal(): Refusal {
    return { code: this.code, message: this.message, issues: this.issues };
  }
}

/** More issues than this help nobody; a document may hold thousands. */
const mostIssues = 50;

/** A name that somebody pasted may be as long as the document; a message quotes it in part. */
function cut(text: string): string {
  return text.length > 500 ? `${text.slice(0, 499)}…` : text;
}

/** Refuses with a single issue whose message is also the whole refusal's. */
export function refuse(code: RefusalCode, path: string, message: string): never {
  throw new Refused(code, message, [{ path, message }]);
}

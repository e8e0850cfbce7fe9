import type { Issue, Refusal, RefusalCode } from '@shared/schemas/refusal';

/**
 * Thrown inside the engine where a document cannot be calculated; `calculateMember` turns it into a value.
 * `issues` name the fields, in the words of the person who typed them.
 */
export class Refused extends Error {
  readonly code: RefusalCode;
  readonly issues: Issue[];

  constructor(code: RefusalCode, message: string, issues: Issue[]) {
    super(message);
    this.name = 'Refused';
    this.code = code;
    this.issues = issues;
  }

  toRefusal(): Refusal {
    return { code: this.code, message: this.message, issues: this.issues };
  }
}

/** Refuses with a single issue whose message is also the whole refusal's. */
export function refuse(code: RefusalCode, path: string, message: string): never {
  throw new Refused(code, message, [{ path, message }]);
}

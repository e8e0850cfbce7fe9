/** Who may do what: the one place that knows. */

export interface Actor {
  id: string;
  role: 'lead' | 'staff';
}

/** What a project says of its people. */
export interface Assigned {
  designerId: string | null;
  checkerId: string | null;
}

export type Action = 'see-project' | 'edit-draft' | 'calculate' | 'change-own-settings';

/**
 * May this person do this to that? The lead sees every project; designer and checker see theirs; only the
 * designer edits a draft. A lead who is also a project's designer has that role's rights too.
 */
export function may(person: Actor, action: Action, project: Assigned | null): boolean {
  switch (action) {
    case 'calculate':
    case 'change-own-settings':
      return true;
    case 'see-project':
      return (
        project !== null &&
        (person.role === 'lead' || project.designerId === person.id || project.checkerId === person.id)
      );
    case 'edit-draft':
      return project !== null && project.designerId === person.id;
  }
}

import type { Session } from '@foldwright/shared/contracts/session';
import type { Visitor } from '../http/visitor';

export function presentSession(visitor: Visitor, csrfToken: string): Session {
  return {
    user: visitor.user === null ? null : { ...visitor.user },
    memberships: visitor.memberships.map((one) => ({ ...one })),
    current: visitor.current === null ? null : { ...visitor.current },
    csrfToken,
  };
}

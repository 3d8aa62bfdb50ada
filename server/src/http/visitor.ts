import type { Access, Role } from '@foldwright/shared/contracts/route';

/** A person who can sign in. */
export interface Person {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly isOperator: boolean;
}

export interface Belonging {
  readonly workshopId: string;
  readonly workshopName: string;
  readonly role: Role;
}

/** Whoever sends a request: somebody signed in or nobody. */
export interface Visitor {
  readonly user: Person | null;
  readonly memberships: readonly Belonging[];
  /** The workshop that this session works in. */
  readonly current: Belonging | null;
}

export interface SignedInVisitor extends Visitor {
  readonly user: Person;
}

/** Somebody in a workshop, with a role that the route admits. */
export interface Member {
  readonly userId: string;
  readonly userName: string;
  readonly workshopId: string;
  readonly workshopName: string;
  readonly role: Role;
}

export const NOBODY: Visitor = { user: null, memberships: [], current: null };

/** Who a handler is called for, by its contract's access. */
export type ActorFor<A extends Access> = A extends 'public'
  ? Visitor
  : A extends 'signed-in'
    ? SignedInVisitor
    : A extends 'service'
      ? null
      : A extends readonly (infer R)[]
        ? 'operator' extends R
          ? SignedInVisitor
          : Member
        : never;

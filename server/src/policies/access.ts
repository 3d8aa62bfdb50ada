import type { Access } from '@foldwright/shared/contracts/route';
import type { Member, SignedInVisitor, Visitor } from '../http/visitor';

/** Outcome of asking whether somebody may call a route. */
export type Admission =
  | { readonly kind: 'admitted'; readonly actor: Visitor | SignedInVisitor | Member | null }
  | { readonly kind: 'not-signed-in' }
  | { readonly kind: 'not-allowed' };

/** Whether the visitor may call a route with this access, and as whom. Pure: knows no rows. */
export function admit(access: Access, visitor: Visitor): Admission {
  if (access === 'service') return { kind: 'admitted', actor: null };
  if (access === 'public') return { kind: 'admitted', actor: visitor };
  const { user, current } = visitor;
  if (user === null) return { kind: 'not-signed-in' };
  if (access === 'signed-in') return { kind: 'admitted', actor: { ...visitor, user } };
  if (access.includes('operator') && user.isOperator) return { kind: 'admitted', actor: { ...visitor, user } };
  if (current === null || !access.includes(current.role)) return { kind: 'not-allowed' };
  const { workshopId, workshopName, role } = current;
  return { kind: 'admitted', actor: { userId: user.id, userName: user.name, workshopId, workshopName, role } };
}

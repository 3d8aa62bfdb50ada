import { ROUTE_CONTRACTS } from '@foldwright/shared/contracts/registry';
import type { RouteContract } from '@foldwright/shared/contracts/route';

/** The contracts of the registry that these modules hold, for an application with only some of the routes. */
export function contractsIn(...modules: readonly object[]): RouteContract[] {
  const exported = new Set<unknown>(modules.flatMap((module) => Object.values(module)));
  return ROUTE_CONTRACTS.filter((contract) => exported.has(contract));
}

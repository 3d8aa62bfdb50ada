import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { memberRoutes } from './members';
import { officeMailRoutes } from './office-mails';
import { operatorRoutes } from './operator';
import { orderRoutes } from './orders';
import { partRoutes } from './parts';
import { photoRoutes } from './photos';
import { reviewRoutes } from './reviews';
import { revisionRoutes } from './revisions';
import { sessionRoutes } from './session';
import { saleLinkRoutes, saleRoutes } from './sales';
import { shopRoutes, storefrontRoutes } from './shop';
import { stockRoutes } from './stock';
import { systemRoutes } from './system';

/** Every route of the product. `serveRoutes` refuses to start when one of the registry is missing here. */
export function allRoutes(dependencies: AppDependencies): BoundRoute[] {
  return [
    ...sessionRoutes(dependencies),
    ...partRoutes(dependencies),
    ...photoRoutes(dependencies),
    ...revisionRoutes(dependencies),
    ...reviewRoutes(dependencies),
    ...orderRoutes(dependencies),
    ...stockRoutes(dependencies),
    ...shopRoutes(dependencies),
    ...storefrontRoutes(dependencies),
    ...saleRoutes(dependencies),
    ...saleLinkRoutes(dependencies),
    ...memberRoutes(dependencies),
    ...officeMailRoutes(dependencies),
    ...operatorRoutes(dependencies),
    ...systemRoutes(dependencies),
  ];
}

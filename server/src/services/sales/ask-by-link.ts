import type { CustomerOrder } from '@foldwright/shared/contracts/sale-links';
import { recordEvent } from '../../events/record-event';
import { askOnSale } from '../shop/questions';
import { presentCustomerOrder } from './assemble-sale';
import type { SaleTools } from './change-sale';
import { findSaleByLink } from './find-by-link';

/** Ask about fit on an order, once under the caller's key; the workshop gets it by mail. @throws Problem `not-found` */
export async function askByLink(tools: SaleTools, link: string, text: string, key: string): Promise<CustomerOrder> {
  const { workshopId, saleId } = await findSaleByLink(tools.database, link);
  return tools.database.inWorkshop(workshopId, async (scope) => {
    const sale = await scope.rows.sales.get(saleId, { lock: true });
    await askOnSale(scope, sale, text, key, tools);
    recordEvent(scope, { kind: 'sale-changed', saleId });
    return presentCustomerOrder(scope, sale);
  });
}

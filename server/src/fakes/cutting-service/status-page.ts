import { escapeHtml, htmlPage } from '../html';
import type { ShopState } from './wire';

export const SHOP_NAME = 'Ashmarrow Sheet Cutting';

/** What the invented shop has on its board: orders, newest first. */
export function statusPage(state: ShopState): string {
  const orders = Object.values(state.orders).reverse();
  const rows = orders.map(
    (order) =>
      `<tr><td>${escapeHtml(order.id)}</td><td>${escapeHtml(order.reference)}</td><td class="number">${order.quantity}</td>` +
      `<td>${escapeHtml(order.state)}</td><td>${escapeHtml(order.trackingCode ?? '')}</td></tr>`,
  );
  const table =
    orders.length === 0
      ? '<p>No orders yet.</p>'
      : `<table><thead><tr><th scope="col">Order</th><th scope="col">Customer’s number</th><th scope="col">Pieces</th>` +
        `<th scope="col">State</th><th scope="col">Tracking</th></tr></thead><tbody>${rows.join('')}</tbody></table>`;
  const body = `<main><h1>${SHOP_NAME}</h1><p>An invented cutting shop that runs on this machine, for trying things out.</p>${table}</main>`;
  return htmlPage(SHOP_NAME, body);
}

export const SHOP_STYLE = `
:root { color-scheme: light dark; font: 16px/1.5 system-ui, sans-serif; }
main { max-width: 60rem; margin: 2rem auto; padding: 0 1rem; }
table { border-collapse: collapse; width: 100%; }
th, td { text-align: left; padding: .4rem .6rem .4rem 0; border-bottom: 1px solid; }
.number { text-align: right; padding-left: 1rem; white-space: nowrap; }
`;

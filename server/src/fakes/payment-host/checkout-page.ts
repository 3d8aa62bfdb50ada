import { escapeHtml, htmlPage } from '../html';
import { DECLINED_CARDS } from './test-cards';
import type { PaymentState, Session } from './objects';

export const DESK_NAME = 'Paydesk, a local payment host for trying things out';

const amountOf = (minor: number, currency: string) =>
  new Intl.NumberFormat('en-IE', { style: 'currency', currency: currency.toUpperCase() }).format(minor / 100);

/** The page where a person types a card. `problem` is said above the form and tied to the card field. */
export function checkoutPage(session: Session, lines: PaymentState['lines'][string], problem: string | null): string {
  const rows = lines.map(
    (line) =>
      `<tr><td>${escapeHtml(line.name)}</td><td class="number">${line.quantity}</td>` +
      `<td class="number">${amountOf(line.quantity * line.unitAmountMinor, session.currency)}</td></tr>`,
  );
  const back =
    session.cancel_url === null ? '' : `<p><a href="${escapeHtml(session.cancel_url)}">Back without paying</a></p>`;
  const message = problem === null ? '' : `<p id="problem" class="problem" role="alert">${escapeHtml(problem)}</p>`;
  const faulty = problem === null ? '' : ' aria-invalid="true" aria-describedby="problem"';
  const declined = DECLINED_CARDS.map((card) => `<code>${card.number.replace(/(\d{4})(?=\d)/g, '$1 ')}</code>`).join(
    ' or ',
  );
  return htmlPage(
    `Pay ${amountOf(session.amount_total, session.currency)}`,
    `<main>
<p class="desk">${DESK_NAME}</p>
<h1>Pay ${amountOf(session.amount_total, session.currency)}</h1>
<table><caption>What you pay for</caption>
<thead><tr><th scope="col">Item</th><th scope="col" class="number">Quantity</th><th scope="col" class="number">Amount</th></tr></thead>
<tbody>${rows.join('')}</tbody></table>
${message}
<form method="post" action="/pay/${escapeHtml(session.id)}">
<p><label for="number">Card number</label><input id="number" name="number" inputmode="numeric" autocomplete="off" required maxlength="23"${faulty}></p>
<p><label for="expiry">Expires (month / year)</label><input id="expiry" name="expiry" placeholder="04 / 30" autocomplete="off" required maxlength="7"></p>
<p><label for="code">Security code</label><input id="code" name="code" inputmode="numeric" autocomplete="off" required maxlength="4"></p>
<p><button type="submit">Pay ${amountOf(session.amount_total, session.currency)}</button></p>
</form>
${back}
<p class="hint">No money moves here. <code>4242 4242 4242 4242</code> with any later date and any code pays; ${declined} is declined.</p>
</main>`,
  );
}

/** What stands at the address of a session that can't be paid any more. */
export function closedPage(session: Session): string {
  const words = session.status === 'complete' ? 'This has been paid already.' : 'This payment page has run out.';
  const back =
    session.cancel_url === null ? '' : `<p><a href="${escapeHtml(session.cancel_url)}">Back to the order</a></p>`;
  return htmlPage('Payment closed', `<main><p class="desk">${DESK_NAME}</p><h1>${words}</h1>${back}</main>`);
}

export const DESK_STYLE = `
:root { color-scheme: light dark; font: 16px/1.5 system-ui, sans-serif; }
body { margin: 0; background: light-dark(#f3f2ee, #1b1c1e); color: light-dark(#1d1e20, #ededea); }
main { max-width: 30rem; margin: 2rem auto; padding: 0 1rem; }
.desk { border-left: 4px solid light-dark(#5b4a8a, #b3a1e6); padding-left: .75rem; }
h1 { font-size: 1.5rem; }
table { width: 100%; border-collapse: collapse; }
caption { text-align: left; }
th, td { text-align: left; padding: .35rem 0; border-bottom: 1px solid light-dark(#8a8a86, #6f6f73); }
.number { text-align: right; padding-left: 1rem; white-space: nowrap; }
label { display: block; font-weight: 600; }
input { font: inherit; width: 100%; box-sizing: border-box; padding: .6rem; }
button { font: inherit; font-weight: 600; padding: .8rem 1.2rem; width: 100%; border: 0; background: light-dark(#43346f, #c7b8f2); color: light-dark(#ffffff, #1b1c1e); }
a { color: light-dark(#43346f, #c7b8f2); }
.problem { border: 2px solid light-dark(#9b1c1c, #ff9d9d); padding: .6rem; }
.hint { color: light-dark(#4b4b4f, #c4c4c2); }
`;

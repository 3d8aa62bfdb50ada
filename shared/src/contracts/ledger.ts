import * as z from 'zod/mini';
import { defineRoute } from './route';
import { moneySchema, rowId, timestamp } from './scalars';

export const LEDGER_ACCOUNTS = ['payment-host', 'sales', 'postage', 'tax', 'refunds', 'cutting', 'paid-out'] as const;
/** Money in double entry: every entry’s postings add up to nothing; a debit is above zero. */
export const ledgerSchema = z.object({
  money: z.object({
    accounts: z.array(z.object({ account: z.enum(LEDGER_ACCOUNTS), balance: moneySchema })),
    entries: z.array(
      z.object({
        id: rowId,
        at: timestamp,
        text: z.string(),
        saleId: z.nullable(rowId),
        orderId: z.nullable(rowId),
        postings: z.array(z.object({ account: z.enum(LEDGER_ACCOUNTS), amount: moneySchema })),
      }),
    ),
    /** Sum over all accounts; anything but 0 is a fault of ours. */
    difference: moneySchema,
    /** What the books say customers paid less refunds, and what the sales themselves say. */
    proof: z.object({ books: moneySchema, sales: moneySchema }),
  }),
  units: z.object({
    rows: z.array(
      z.object({
        positionId: rowId,
        what: z.string(),
        received: z.int(),
        adjusted: z.int(),
        returned: z.int(),
        shipped: z.int(),
        onHand: z.int(),
        reserved: z.int(),
        /** What sales say is reserved and shipped for this position. */
        salesReserved: z.int(),
        salesShipped: z.int(),
        difference: z.int(),
      }),
    ),
    difference: z.int(),
  }),
});
export type Ledger = z.output<typeof ledgerSchema>;

export const readLedger = defineRoute({
  id: 'readLedger',
  method: 'GET',
  path: '/api/ledger',
  tag: 'ledger',
  access: ['owner'],
  summary: 'The books: money to the cent and brackets to the piece, with the proof that both balance',
  answer: 'json',
  response: ledgerSchema,
  successStatus: 200,
});

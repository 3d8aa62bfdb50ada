import * as z from 'zod/mini';
import type { CuttingService } from '../cutting/cutting-service';
import type { FileStore } from '../files/file-store';
import type { PaymentHost } from '../payments/payment-host';
import type { SendMailTools } from '../services/send-mail';
import { sendMail } from '../services/send-mail';
import { closeSaleCheckout, expireSale, sendRefund } from '../services/sales/settle-sale';
import { closeCheckout, refundPayment } from '../services/settle-payment';
import { submitCuttingOrder } from '../services/submit-cutting-order';
import { writeSolids } from '../services/write-solids';
import type { QueueName } from './queue';

/** What the work after commit of orders needs. */
export interface CommerceTools extends SendMailTools {
  readonly files: FileStore;
  readonly cutting: CuttingService;
  readonly payments: PaymentHost;
}

/** Does one piece of work of a queue; a thrown error has the queue try again. */
type Handle = (data: unknown) => Promise<void>;

const mailWork = z.object({ workshopId: z.uuid(), mailId: z.uuid() });
const orderWork = z.object({ workshopId: z.uuid(), orderId: z.uuid() });
const paymentWork = z.discriminatedUnion('task', [
  z.object({ task: z.literal('refund'), ...orderWork.shape, paymentId: z.string() }),
  z.object({ task: z.literal('close-checkout'), ...orderWork.shape }),
]);

const saleWork = z.discriminatedUnion('task', [
  z.object({ task: z.literal('refund'), workshopId: z.uuid(), refundId: z.uuid() }),
  z.object({ task: z.literal('expire'), workshopId: z.uuid(), saleId: z.uuid() }),
  z.object({ task: z.literal('close-checkout'), workshopId: z.uuid(), saleId: z.uuid() }),
]);

const solidWork = z.object({ workshopId: z.uuid(), revisionId: z.uuid() });

/** The handlers of everything that follows a release or an order: solids, mail, the cutting service, the payment host. */
export function commerceWork(tools: CommerceTools): Readonly<Record<Exclude<QueueName, 'trace'>, Handle>> {
  return {
    solid: (data) => writeSolids(tools.database, tools.files, solidWork.parse(data)),
    mail: (data) => sendMail(tools, mailWork.parse(data)),
    'cutting-order': (data) => submitCuttingOrder(tools, orderWork.parse(data)),
    payment: async (data) => {
      const work = paymentWork.parse(data);
      if (work.task === 'refund') await refundPayment(tools.payments, work);
      else await closeCheckout(tools, work);
    },
    sale: async (data) => {
      const work = saleWork.parse(data);
      if (work.task === 'refund') await sendRefund(tools, work);
      else if (work.task === 'expire') await expireSale(tools, work);
      else await closeSaleCheckout(tools, work);
    },
  };
}

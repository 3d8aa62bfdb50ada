import type { Mail as MailContract } from '@foldwright/shared/contracts/office';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import { presentMail } from '../presenters/mails';

/** Mails are kept for ever; the page shows the newest of them. */
const SHOWN = 200;

/** Outgoing mail of a workshop, newest first. */
export async function listMails(database: Database, { workshopId }: Member): Promise<MailContract[]> {
  return database.inWorkshop(workshopId, async ({ rows }) => {
    const mails = await rows.mails.list({
      order: [
        ['createdAt', 'DESC'],
        ['id', 'ASC'],
      ],
      limit: SHOWN,
    });
    return mails.map(presentMail);
  });
}

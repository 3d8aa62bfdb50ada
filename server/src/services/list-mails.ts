import type { Mail as MailContract } from '@foldwright/shared/contracts/office';
import { Op } from 'sequelize';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import { presentMail } from '../presenters/mails';
import { INVITATION_MAILS } from './members/invitations';

/** Mails are kept for ever; the page shows the newest of them. */
const SHOWN = 200;

/**
 * Outgoing mail of a workshop, newest first. Owners alone see invitations: whoever reads the link of somebody without an
 * account could join in their place, as an owner even.
 */
export async function listMails(database: Database, { workshopId, role }: Member): Promise<MailContract[]> {
  return database.inWorkshop(workshopId, async ({ rows }) => {
    const mails = await rows.mails.list({
      ...(role === 'owner' ? {} : { where: { key: { [Op.notLike]: `${INVITATION_MAILS}%` } } }),
      order: [
        ['createdAt', 'DESC'],
        ['id', 'ASC'],
      ],
      limit: SHOWN,
    });
    return mails.map(presentMail);
  });
}

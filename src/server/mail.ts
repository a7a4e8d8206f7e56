import { createTransport, type Transporter } from 'nodemailer';
import type { Transaction } from 'sequelize';
import type { Letter } from '@/lib/letter';
import { config } from './config';
import { OutgoingMail, sequelize } from './models';
import { enqueue, type JobHandler } from './queue';

let transport: Transporter | undefined;

/** Puts a letter into the outbox; it is sent by the worker once the transaction has committed. */
export async function queueMail(letter: Letter, transaction?: Transaction): Promise<void> {
  if (!transaction) return sequelize.transaction((t) => queueMail(letter, t));
  const mail = await OutgoingMail.create({ ...letter }, { transaction });
  await enqueue({ kind: 'mail', targetId: mail.id, workspaceId: null, createdBy: null }, transaction);
}

/** The job that sends one letter, once. */
export const sendMail: JobHandler = async ({ targetId }) => {
  const mail = await OutgoingMail.findByPk(targetId);
  if (!mail || mail.sentAt) return null;
  transport ??= createTransport(config().SMTP_URL);
  await transport.sendMail({
    from: config().MAIL_FROM,
    to: mail.to,
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
    messageId: `<${mail.id}@thrum>`,
  });
  // The words are of no further use once sent, and may hold a sign-in link.
  await mail.update({ sentAt: new Date(), text: '', html: '' });
  return null;
};

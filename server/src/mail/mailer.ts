/** One mail, ready to go. The message id is fixed when the mail is written, so that a second sending can be recognised. */
export interface OutgoingMail {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly messageId: string;
}

/** The mail server did not take the mail. `isFinal` when trying again can't help. */
export class MailNotTaken extends Error {
  constructor(
    message: string,
    readonly isFinal: boolean,
  ) {
    super(message);
  }
}

/** A way to send mail. */
export interface Mailer {
  /** @throws MailNotTaken */
  send(mail: OutgoingMail): Promise<void>;
  close(): void;
}

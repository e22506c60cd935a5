/** One mail as it is to be sent. `messageId` is fixed, so that a repeat is recognised as the same mail. */
export interface OutgoingMail {
  /** In angle brackets. */
  messageId: string;
  to: string;
  subject: string;
  text: string;
  html: string;
  /** When it was written; stays the same in a repeat. */
  date: Date;
}

/** Hands a mail to whatever delivers it. */
export interface MailerPort {
  /**
   * Resolves once the mail has been taken over for delivery; the same mail may be handed over again after a crash.
   * @throws Error with the reason when it was not taken over
   */
  send(mail: OutgoingMail): Promise<void>;
  close(): void;
}

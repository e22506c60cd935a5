/** One mail as it is to be sent. `messageId` is fixed, so that a repeat is recognised as the same mail. */
export interface OutgoingMail {
  /** In angle brackets. */
  messageId: string;
  to: string;
  subject: string;
  text: string;
  html: string;
  /** Shown within the HTML, which names each by `cid:` and its id. */
  pictures: readonly MailPicture[];
  /** Where the reader stops mails of this kind by one request (RFC 8058); null where there is nothing to stop. */
  stopUrl: string | null;
  /** When it was written; stays the same in a repeat. */
  date: Date;
}

/** A JPEG that comes with a mail. */
export interface MailPicture {
  /** Without angle brackets. */
  contentId: string;
  fileName: string;
  jpeg: Buffer;
}

/** The mail server will not take this mail, however often it is tried: no such mailbox, or it is refused as a whole. */
export class MailRefused extends Error {}

/** Hands a mail to whatever delivers it. */
export interface MailerPort {
  /**
   * Resolves once the mail has been taken over for delivery; the same mail may be handed over again after a crash.
   * @throws MailRefused when trying again is of no use; any other Error with the reason when it was not taken over
   */
  send(mail: OutgoingMail): Promise<void>;
  close(): void;
}

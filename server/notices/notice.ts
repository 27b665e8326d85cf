/** A mail that a command owes, to one person. `kind` names the entry in `catalogue.ts` that writes it. */
export type Notice = {
  readonly kind: string;
  readonly recipientId: string;
  readonly payload: Readonly<Record<string, unknown>>;
};

/** What a mail is made of; the mailer adds sender, recipient, Message-ID and the frame around the text. */
export type Mail = {
  readonly subject: string;
  /** Paragraphs of plain text; the HTML form is made from them, escaped. */
  readonly paragraphs: readonly string[];
  /** The exact page to open, as a path within the app. */
  readonly link: { readonly label: string; readonly path: string } | null;
};

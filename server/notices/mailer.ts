import nodemailer from 'nodemailer';
import * as z from 'zod';
import type { Mail } from './notice.ts';

/** Hands one mail over to the mail server; rejects when it was not taken. */
export type Mailer = {
  readonly send: (mail: Mail, to: { readonly id: string; readonly address: string }) => Promise<void>;
  readonly close: () => void;
};

const escapes: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => escapes[character] ?? character);
}

const singleLine = (text: string) => text.replace(/\s+/g, ' ').trim();

export function createMailer(options: {
  readonly host: string;
  readonly port: number;
  readonly from: string;
  readonly publicAddress: string;
}): Mailer {
  const transport = nodemailer.createTransport({
    host: options.host,
    port: options.port,
    secure: false,
    pool: true,
    connectionTimeout: 5000,
    greetingTimeout: 5000,
    socketTimeout: 10_000,
  });
  const domain = new URL(options.publicAddress).hostname;
  return {
    send: async (mail, to) => {
      // A comma or a line break in an address would reach somebody else.
      const address = z.email().parse(to.address);
      const link = mail.link && { label: mail.link.label, address: `${options.publicAddress}${mail.link.path}` };
      const text = [...mail.paragraphs, ...(link ? [`${link.label}: ${link.address}`] : [])].join('\n\n');
      const html = [
        ...mail.paragraphs.map((paragraph) => `<p>${escapeHtml(paragraph).replace(/\n/g, '<br>')}</p>`),
        ...(link ? [`<p><a href="${escapeHtml(link.address)}">${escapeHtml(link.label)}</a></p>`] : []),
      ].join('\n');
      await transport.sendMail({
        from: options.from,
        to: { name: '', address },
        subject: singleLine(mail.subject).slice(0, 200),
        messageId: `<${to.id}@${domain}>`,
        text,
        html: `<!doctype html><html lang="en"><body>${html}</body></html>`,
      });
    },
    close: () => transport.close(),
  };
}

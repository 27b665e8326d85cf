import * as z from 'zod';
import type { Mail } from './notice.ts';

type Recipient = { readonly name: string };

/** Ties the shape of a payload to the words made of it; a payload of another shape is a programming error. */
function defineMail<Shape extends z.ZodType>(shape: Shape, write: (payload: z.output<Shape>, to: Recipient) => Mail) {
  return (payload: unknown, to: Recipient): Mail => write(shape.parse(payload), to);
}

const submission = z.object({
  submissionId: z.string(),
  studyTitle: z.string(),
  targetName: z.string(),
  byName: z.string(),
});
const open = (submissionId: string) => ({ label: 'Open the submission', path: `/submissions/${submissionId}` });

/** Every mail Stemma sends. A mail links to the exact page; opening the link changes nothing. */
export const mailCatalogue: Readonly<Record<string, (payload: unknown, to: Recipient) => Mail>> = {
  'submission-waits': defineMail(submission.extend({ note: z.string() }), (given) => ({
    subject: `${given.targetName} waits for your review (${given.studyTitle})`,
    paragraphs: [
      `${given.byName} submitted ${given.targetName} of the study "${given.studyTitle}" for review.`,
      ...(given.note ? [`Note: ${given.note}`] : []),
      'Rule on each assumption, then sign it or return it with comments.',
    ],
    link: open(given.submissionId),
  })),
  'submission-signed': defineMail(submission.extend({ meaning: z.string(), snapshotHash: z.string() }), (given) => ({
    subject: `${given.targetName} is signed (${given.studyTitle})`,
    paragraphs: [
      `${given.byName} signed ${given.targetName} of the study "${given.studyTitle}".`,
      `Meaning: ${given.meaning}`,
      `Receipt: SHA-256 of the signed snapshot ${given.snapshotHash}. Keep this mail; it witnesses what was signed.`,
    ],
    link: open(given.submissionId),
  })),
  'submission-returned': defineMail(submission.extend({ comments: z.string() }), (given) => ({
    subject: `${given.targetName} is returned to you (${given.studyTitle})`,
    paragraphs: [
      `${given.byName} returned ${given.targetName} of the study "${given.studyTitle}".`,
      `Comments: ${given.comments}`,
    ],
    link: open(given.submissionId),
  })),
  'submission-withdrawn': defineMail(submission.extend({ reason: z.string() }), (given) => ({
    subject: `${given.targetName} no longer waits for you (${given.studyTitle})`,
    paragraphs: [
      `${given.byName} withdrew the submission of ${given.targetName} of the study "${given.studyTitle}".`,
      `Reason: ${given.reason}`,
    ],
    link: open(given.submissionId),
  })),
  'person-invited': defineMail(z.object({ token: z.string(), byName: z.string() }), (given, to) => ({
    subject: 'Your account at Stemma',
    paragraphs: [
      `${to.name}, ${given.byName} made an account for you at Stemma, where scale-up numbers are kept with their lineage.`,
      'Choose a password of at least 15 characters. The link works once, within seven days.',
    ],
    link: { label: 'Choose a password', path: `/password/${given.token}` },
  })),
  'password-link': defineMail(z.object({ token: z.string() }), (given) => ({
    subject: 'A new password for Stemma',
    paragraphs: [
      'Somebody asked for a new password for your account. The link works once, within two hours.',
      'If it was not you, do nothing: your password stays as it is.',
    ],
    link: { label: 'Choose a new password', path: `/password/${given.token}` },
  })),
};

import type { Letter } from '../../ports/mail/letter.js';

export const companyDeletedLetter = (name: string, company: string, by: string): Letter => ({
  subject: `${company} was deleted`,
  paragraphs: [
    `Hello ${name},`,
    `${by} deleted ${company} a moment ago, with all its clients, jobs, plans and files. Your account remains.`,
  ],
});

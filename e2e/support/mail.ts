import { type APIRequestContext, expect } from '@playwright/test';

export interface Mail {
  readonly id: string;
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
  readonly attachments: readonly { readonly fileName: string; readonly type: string }[];
}

async function mailsTo(request: APIRequestContext, address: string): Promise<Mail[]> {
  const answer = await request.get('/dev/mail/messages.json');
  const { items } = (await answer.json()) as { items: Mail[] };
  return items.filter((mail) => mail.to.includes(address));
}

/** The link in the newest mail to an address, once one whose subject fits has arrived. */
export async function linkMailedTo(
  request: APIRequestContext,
  address: string,
  subject: RegExp,
): Promise<string> {
  let link: string | undefined;
  await expect
    .poll(
      async () => {
        const mail = (await mailsTo(request, address)).find((m) => subject.test(m.subject));
        link = mail?.text.match(/https?:\/\/\S+/)?.[0];
        return link;
      },
      { message: `a mail to ${address} about ${subject}` },
    )
    .toBeTruthy();
  return link!;
}

export async function countMailsTo(request: APIRequestContext, address: string): Promise<number> {
  return (await mailsTo(request, address)).length;
}

interface Wanted {
  readonly subject: RegExp;
  /** The name of a file that comes with it. */
  readonly file?: RegExp;
}

/** The newest mail to an address that fits, once one has arrived. */
export async function mailTo(
  request: APIRequestContext,
  address: string,
  { subject, file }: Wanted,
): Promise<Mail> {
  let found: Mail | undefined;
  await expect
    .poll(
      async () => {
        found = (await mailsTo(request, address)).find(
          (mail) =>
            subject.test(mail.subject) &&
            (file === undefined || mail.attachments.some(({ fileName }) => file.test(fileName))),
        );
        return found?.subject;
      },
      { message: `a mail to ${address} about ${subject}`, timeout: 20_000 },
    )
    .toBeTruthy();
  return found!;
}

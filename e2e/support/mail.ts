import { type APIRequestContext, expect } from '@playwright/test';

interface Mail {
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
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

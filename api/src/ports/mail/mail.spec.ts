import { mkdtemp, rm } from 'node:fs/promises';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { SMTPServer } from 'smtp-server';
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { MemoryStorage } from '../../../test/memory-storage.js';
import { SendMail } from '../../jobs/mail.js';
import { type MailCatcher, startMailCatcher } from './catcher.js';
import { caughtMailListSchema } from './caught-mail.js';
import { renderLetter } from './letter.js';
import { MailRepository } from './mail.repository.js';
import { Mailer, type OutgoingMail } from './mailer.js';
import { Outbox } from './outbox.js';
import { SmtpMailer } from './smtp-mailer.js';

class RecordingMailer extends Mailer {
  readonly sent: OutgoingMail[] = [];
  failing = false;
  async send(mail: OutgoingMail): Promise<void> {
    if (this.failing) throw new Error('The mail service is away.');
    // Time for another worker to begin with the same message.
    await new Promise((resolve) => setTimeout(resolve, 30));
    this.sent.push(mail);
  }
  close(): void {}
}

describe('mail', () => {
  let dir: string;
  let catcher: MailCatcher;
  let test: TestApp;
  beforeAll(async () => {
    dir = await mkdtemp(join(tmpdir(), 'lampwright-mail-'));
    catcher = await startMailCatcher({ smtpPort: 0, httpPort: 0, dir });
    test = await startTestApp({ SMTP_URL: catcher.smtpUrl, MAIL_VIEWER_URL: catcher.httpUrl });
  });
  afterAll(async () => {
    await test.close();
    await catcher.close();
    await rm(dir, { recursive: true, force: true });
  });

  const inbox = async (address: string) => {
    const { body } = await test.agent().get('/dev/mail/messages.json').expect(200);
    return caughtMailListSchema.parse(body).items.filter(({ to }) => to.includes(address));
  };
  const outbox = () => test.app.get(Outbox, { strict: false });
  const rowsTo = async (address: string) =>
    (await test.database.executeSql('SELECT * FROM mail_messages WHERE "to" = $1', [address])).rows as {
      id: string;
      attempts: number;
      sent_at: Date | null;
      text: string;
    }[];

  describe('from the outbox', () => {
    const mailer = new RecordingMailer();
    const storage = new MemoryStorage();
    afterEach(() => {
      mailer.sent.length = 0;
      mailer.failing = false;
    });
    const handler = () =>
      new SendMail(test.env, test.database, test.app.get(MailRepository, { strict: false }), mailer, storage);

    it('is written with the transaction, or not at all', async () => {
      await expect(
        test.database.transaction(async () => {
          await outbox().post(null, 'undone@example.com', { subject: 'Undone', paragraphs: ['No.'] });
          throw new Error('changed its mind');
        }),
      ).rejects.toThrow('changed its mind');
      expect(await rowsTo('undone@example.com')).toEqual([]);
      await outbox().post(null, 'done@example.com', { subject: 'Done', paragraphs: ['Yes.'] });
      const [row] = await rowsTo('done@example.com');
      const jobs = await test.database.executeSql("SELECT data FROM pgboss.job WHERE name = 'mail.send'");
      expect(jobs.rows).toEqual([{ data: { messageId: row?.id } }]);
      await test.database.executeSql("DELETE FROM pgboss.job WHERE name = 'mail.send'");
    });

    it('goes out once, however often its job runs', async () => {
      const [row] = await rowsTo('done@example.com');
      const job = { messageId: row!.id };
      await Promise.all([1, 2, 3].map(() => handler().handle(job)));
      await handler().handle(job);
      expect(mailer.sent).toHaveLength(1);
      expect(mailer.sent[0]).toMatchObject({ messageId: `<${row!.id}@127.0.0.1>`, to: 'done@example.com' });
      const [after] = await rowsTo('done@example.com');
      expect(after?.sent_at).not.toBeNull();
      expect(after?.text).toBe('');
    });

    it('carries files from storage and where answers go', async () => {
      await storage.put('company/a.pdf', Buffer.from('%PDF-1.7 a'), 'application/pdf');
      await outbox().post(null, 'files@example.com', {
        subject: 'With a file',
        paragraphs: ['Here it is.'],
        attachments: [{ key: 'company/a.pdf', fileName: 'Proposal 1042.pdf', type: 'application/pdf' }],
        replyTo: 'studio@example.com',
        signature: 'Fernhollow <Outdoor>',
      });
      const [row] = await rowsTo('files@example.com');
      expect(row?.text).toMatch(/\n\nFernhollow <Outdoor>\n$/);
      await handler().handle({ messageId: row!.id });
      expect(mailer.sent).toMatchObject([
        {
          replyTo: 'studio@example.com',
          attachments: [
            { fileName: 'Proposal 1042.pdf', type: 'application/pdf', body: Buffer.from('%PDF-1.7 a') },
          ],
        },
      ]);
      expect(mailer.sent[0]?.html).toContain('>Fernhollow &lt;Outdoor&gt;</p>');
    });

    it('waits for a file that is missing, and never goes without it', async () => {
      await outbox().post(null, 'missing@example.com', {
        subject: 'Without its file',
        paragraphs: ['Here it is.'],
        attachments: [{ key: 'company/b.pdf', fileName: 'b.pdf', type: 'application/pdf' }],
      });
      const [row] = await rowsTo('missing@example.com');
      await expect(handler().handle({ messageId: row!.id })).rejects.toThrow('not in object storage');
      expect(mailer.sent).toEqual([]);
      expect(await rowsTo('missing@example.com')).toMatchObject([{ attempts: 1, sent_at: null }]);
      await storage.put('company/b.pdf', Buffer.from('%PDF-1.7 b'), 'application/pdf');
      await handler().handle({ messageId: row!.id });
      expect(mailer.sent).toHaveLength(1);
    });

    it('stays when the service is away, and counts the attempts', async () => {
      await outbox().post(null, 'later@example.com', { subject: 'Later', paragraphs: ['Soon.'] });
      await test.database.executeSql("DELETE FROM pgboss.job WHERE name = 'mail.send'");
      const [row] = await rowsTo('later@example.com');
      const job = { messageId: row!.id };
      mailer.failing = true;
      for (const _ of [1, 2]) await expect(handler().handle(job)).rejects.toThrow('away');
      expect(await rowsTo('later@example.com')).toMatchObject([{ attempts: 2, sent_at: null }]);
      mailer.failing = false;
      await handler().handle(job);
      expect(mailer.sent).toHaveLength(1);
    });
  });

  it('travels from a request through the worker to the catcher, and is read at /dev/mail', async () => {
    await test.startWorker();
    const { email } = await test.signUp();
    await test.agent().post('/api/auth/forgot-password').send({ email }).expect(202);
    await vi.waitFor(async () => expect(await inbox(email)).toHaveLength(1), {
      timeout: 20_000,
      interval: 200,
    });
    const [mail] = await inbox(email);
    expect(mail).toMatchObject({ subject: 'Choose a new password', to: [email] });
    expect(mail?.from).toContain('post@example.com');
    const link = /http:\/\/\S+#token=[\w-]+/.exec(mail?.text ?? '')?.[0];
    expect(link).toBeDefined();
    const list = await test.agent().get('/dev/mail').expect(200);
    expect(list.text).toContain(`/dev/mail/messages/${mail?.id}`);
    const page = await test.agent().get(`/dev/mail/messages/${mail?.id}`).expect(200);
    expect(page.text).toContain(`<a href="${link}">`);
    expect(page.headers['content-security-policy']).not.toContain('script-src');
    await test.agent().get('/dev/mail/messages/1b4e28ba-2fa1-4d3b-a3f5-ef19b5a7633b').expect(404);
  });

  it('shows attachments at /dev/mail as links that open', async () => {
    const mailer = new SmtpMailer(test.env);
    const pdf = Buffer.from('%PDF-1.7 \0\xff bytes', 'latin1');
    const page = Buffer.from('<script>alert(1)</script>');
    await mailer.send({
      messageId: '<with-files@example.com>',
      to: 'reader@example.com',
      subject: 'Two files',
      text: 'Two files.\n',
      html: '<p>Two files.</p>',
      replyTo: 'studio@example.com',
      attachments: [
        { fileName: 'Angebot größer "1".pdf', type: 'application/pdf', body: pdf },
        { fileName: 'page.html', type: 'text/html', body: page },
      ],
    });
    mailer.close();
    const [mail] = await inbox('reader@example.com');
    expect(mail).toMatchObject({
      replyTo: 'studio@example.com',
      attachments: [
        { fileName: 'Angebot größer "1".pdf', type: 'application/pdf', bytes: pdf.length },
        { fileName: 'page.html', type: 'text/html', bytes: page.length },
      ],
    });
    const address = `/dev/mail/messages/${mail!.id}`;
    const shown = await test.agent().get(address).expect(200);
    expect(shown.text).toContain(`<a href="${address}/attachments/0">Angebot größer &quot;1&quot;.pdf</a>`);
    const first = await test.agent().get(`${address}/attachments/0`).expect(200);
    expect(first.headers).toMatchObject({ 'content-type': 'application/pdf' });
    expect(first.headers['content-disposition']).toBe(
      "inline; filename*=UTF-8''Angebot%20gr%C3%B6%C3%9Fer%20%221%22.pdf",
    );
    expect(first.body).toEqual(pdf);
    // Markup from a message is saved, never run.
    const second = await test.agent().get(`${address}/attachments/1`).expect(200);
    expect(second.headers['content-type']).toBe('application/octet-stream');
    expect(second.headers['content-disposition']).toContain('attachment;');
    await test.agent().get(`${address}/attachments/2`).expect(404);
  });

  it('outlasts a restart of the catcher', async () => {
    const place = await mkdtemp(join(dir, 'restart-'));
    const options = { smtpPort: 0, httpPort: 0, dir: place };
    const first = await startMailCatcher(options);
    const mailer = new SmtpMailer({ ...test.env, SMTP_URL: first.smtpUrl });
    for (const n of [1, 2])
      await mailer.send({
        messageId: `<${n}@example.com>`,
        to: 'twice@example.com',
        subject: `Number ${n} – größer`,
        text: 'A line\n',
        html: '<p>A line</p>',
      });
    mailer.close();
    await first.close();
    const second = await startMailCatcher(options);
    const { items } = caughtMailListSchema.parse(await (await fetch(`${second.httpUrl}/messages`)).json());
    await second.close();
    expect(items.map(({ subject, messageId }) => [subject, messageId])).toEqual([
      ['Number 2 – größer', '<2@example.com>'],
      ['Number 1 – größer', '<1@example.com>'],
    ]);
  });

  it('names nobody in the error of a message that was not taken', async () => {
    const server = new SMTPServer({
      authOptional: true,
      disabledCommands: ['STARTTLS'],
      onRcptTo: ({ address }, _session, done) =>
        done(Object.assign(new Error(`<${address}> is unknown here`), { responseCode: 550 })),
    });
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const { port } = server.server.address() as AddressInfo;
    const mail = { messageId: '<1@x>', to: 'gone@example.com', subject: 's', text: 't', html: 'h' };
    const refused = new SmtpMailer({ ...test.env, SMTP_URL: `smtp://127.0.0.1:${port}` });
    await expect(refused.send(mail)).rejects.toThrow(/^The mail service did not take the message \(550\)\.$/);
    refused.close();
    await new Promise<void>((resolve) => server.close(resolve));
    const away = new SmtpMailer({ ...test.env, SMTP_URL: `smtp://127.0.0.1:${port}` });
    await expect(away.send(mail)).rejects.toThrow('(ESOCKET)');
    away.close();
  });

  it('can’t be made to carry somebody’s markup', () => {
    const { html, text } = renderLetter({
      subject: 'Hello',
      paragraphs: ['<img src=x onerror=alert(1)> & "co"'],
      action: { label: 'Go', url: 'http://127.0.0.1/"><script>' },
    });
    expect(html).not.toMatch(/<img|<script/);
    expect(text).toContain('<img src=x onerror=alert(1)> & "co"');
  });

  it('has no viewer in production', async () => {
    const production = await startTestApp({
      LAMPWRIGHT_MODE: 'production',
      PUBLIC_URL: 'https://lampwright.example',
    });
    try {
      await production.agent().get('/dev/mail').expect(404);
      await production.agent().get('/dev/mail/messages.json').expect(404);
      const answer = await production.agent().post('/api/auth/sign-up').send({
        companyName: 'Real',
        name: 'Real Person',
        email: 'real@example.com',
        password: 'real enough',
      });
      expect(answer.headers['set-cookie']?.[0]).toMatch(/; HttpOnly; Secure; SameSite=Lax$/);
    } finally {
      await production.close();
    }
  });
});

import { randomUUID } from 'node:crypto';
import { mkdir, readdir, readFile, rename, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { ParsedMail } from 'mailparser';
import { type CaughtMail, caughtMailSchema } from './caught-mail.js';

/** Caught messages, a JSON file each, so that they outlast a restart. */
export class CaughtMailStore {
  private readonly mails = new Map<string, CaughtMail>();
  private count = 0;

  private constructor(private readonly dir: string) {}

  /** Opens a folder with whatever was caught into it before. */
  static async open(dir: string): Promise<CaughtMailStore> {
    await mkdir(dir, { recursive: true });
    const store = new CaughtMailStore(dir);
    for (const file of (await readdir(dir)).filter((name) => name.endsWith('.json')).sort()) {
      const mail = caughtMailSchema.parse(JSON.parse(await readFile(join(dir, file), 'utf8')));
      store.mails.set(mail.id, mail);
      store.count = Math.max(store.count, Number.parseInt(file, 10) || 0);
    }
    return store;
  }

  /** Keeps a message; it is on disk when this resolves. */
  async add(parsed: ParsedMail, to: readonly string[]): Promise<void> {
    const mail: CaughtMail = {
      id: randomUUID(),
      receivedAt: new Date().toISOString(),
      messageId: parsed.messageId ?? '',
      from: parsed.from?.text ?? '',
      to: [...to],
      subject: parsed.subject ?? '',
      text: parsed.text ?? '',
      html: parsed.html || '',
      replyTo: parsed.replyTo?.text ?? '',
      attachments: parsed.attachments.map(({ filename, contentType, content }) => ({
        fileName: filename ?? '',
        type: contentType,
        bytes: content.length,
      })),
    };
    this.count += 1;
    // Numbered, so that the order of arrival can be read from the names.
    const path = join(this.dir, `${String(this.count).padStart(8, '0')}-${mail.id}.json`);
    // The attachments first: a message that is listed has them.
    await Promise.all(
      parsed.attachments.map(({ content }, index) => writeFile(this.attachmentPath(mail.id, index), content)),
    );
    await writeFile(`${path}.new`, JSON.stringify(mail, null, 1));
    await rename(`${path}.new`, path);
    this.mails.set(mail.id, mail);
  }

  /** Newest first. */
  list(): CaughtMail[] {
    return [...this.mails.values()].reverse();
  }

  get(id: string): CaughtMail | undefined {
    return this.mails.get(id);
  }

  /** The bytes of an attachment, counted from 0; undefined when there is no such one. */
  async attachment(id: string, index: number): Promise<{ type: string; body: Buffer } | undefined> {
    const attachment = this.mails.get(id)?.attachments[index];
    return attachment && { type: attachment.type, body: await readFile(this.attachmentPath(id, index)) };
  }

  private attachmentPath(id: string, index: number): string {
    return join(this.dir, `${id}.${index}.attachment`);
  }
}

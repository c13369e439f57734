import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { readdir } from 'node:fs/promises';
import { request } from 'node:http';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { executable, gif, heic, pdf, phonePhoto, quarters, svg, zip } from '../../media/files.testkit.js';
import { MAX_UPLOAD_BYTES } from '../../media/limits.js';
import { SheetsModule } from './sheets.module.js';
import { newJob, type SheetTest, startSheetTest, until } from './sheets.testkit.js';
import { UploadInterceptor } from './upload.interceptor.js';

const MEGABYTE = 1024 * 1024;

/** Sends a file of random bytes that begins like a JPEG, from a process of its own. */
const SENDER = `
  const { randomBytes } = require('node:crypto');
  const [url, cookie, bytes] = process.argv.slice(1);
  const b = 'lampwright-boundary';
  const request = require('node:http').request(url, {
    method: 'POST',
    headers: { Cookie: cookie, 'Content-Type': 'multipart/form-data; boundary=' + b },
  }, (response) => { console.log(response.statusCode); response.resume(); process.exitCode = 0; });
  request.on('error', () => console.log('cut'));
  request.write('--' + b + '\\r\\nContent-Disposition: form-data; name="view"\\r\\n\\r\\nphoto\\r\\n');
  request.write('--' + b + '\\r\\nContent-Disposition: form-data; name="file"; filename="a.jpg"\\r\\n\\r\\n');
  request.write(Buffer.from([0xff, 0xd8, 0xff, 0xe0]));
  let left = Number(bytes) - 4;
  const more = () => {
    while (left > 0) {
      const part = randomBytes(Math.min(left, 1 << 18));
      left -= part.length;
      if (!request.write(part)) return request.once('drain', more);
    }
    request.end('\\r\\n--' + b + '--\\r\\n');
  };
  more();
`;

describe('files at the door', () => {
  let test: SheetTest;
  let owner: TestPerson;
  let path: string;
  beforeAll(async () => {
    test = await startSheetTest();
    owner = await addPerson(test, await addCompany(test), 'owner');
    path = `/api/jobs/${await newJob(owner.agent)}/sheets`;
  });
  afterAll(() => test?.close());

  const post = (file: Buffer, name: string, view = 'photo') =>
    owner.agent.post(path).field('view', view).attach('file', file, name);

  it.each([
    ['an empty file', Buffer.alloc(0), 'photo.jpg', 'file-empty', 'empty'],
    ['a HEIC photo', heic(), 'photo.jpg', 'file-heic', 'HEIC'],
    ['a GIF', gif(), 'photo.png', 'file-type', 'gif'],
    ['an SVG', svg(), 'plan.png', 'file-type', 'JPEG, PNG or WebP'],
    ['a ZIP', zip(), 'photo.jpg', 'file-type', 'zip'],
    ['a program', executable(), 'photo.jpg', 'file-type', 'exe'],
    ['plain text', Buffer.from('Dear garden,'), 'photo.jpg', 'file-type', 'could not be recognised'],
    ['a PDF as a photo', pdf(1), 'photo.jpg', 'pdf-is-no-photo', 'plot plan'],
  ])('refuses %s, whatever it is called', async (_what, file, name, code, words) => {
    const { body } = await post(file, name).expect(415);
    expect(body.code).toBe(code);
    expect(body.detail).toContain(words);
  });

  it('goes by the bytes where the name says something else', async () => {
    await post(await quarters().png().toBuffer(), 'photo.exe').expect(202);
    await post(await quarters().webp().toBuffer(), 'noname').expect(202);
    await post(pdf(1), 'drawing.jpg', 'plan').expect(202);
  });

  it('names the fault of a form that is not as it should be', async () => {
    const photo = await phonePhoto();
    const pointers = async (sent: ReturnType<typeof post>) =>
      (await sent.expect(400)).body.errors.map((error: { pointer: string }) => error.pointer);
    expect(await pointers(owner.agent.post(path).field('view', 'photo'))).toEqual(['/file']);
    expect(await pointers(owner.agent.post(path).attach('file', photo, 'a.jpg'))).toEqual(['/view']);
    expect(await pointers(post(photo, 'a.jpg', 'painting'))).toEqual(['/view']);
    expect(await pointers(post(photo, 'a.jpg').field('colour', 'blue'))).toEqual(['/colour']);
    expect(await pointers(post(photo, 'a.jpg').attach('file', photo, 'b.jpg'))).toEqual(['/file']);
    expect(
      await pointers(owner.agent.post(path).field('view', 'photo').attach('picture', photo, 'a.jpg')),
    ).toEqual(['/file']);
    expect((await owner.agent.post(path).send({ view: 'photo' }).expect(415)).body.code).toBe(
      'not-multipart',
    );
  });

  /** Sends from another process while this one, with the API and the stand-in for storage in it, is watched. */
  const sendWatched = async (bytes: number) => {
    const before = process.memoryUsage().rss;
    let peak = before;
    const watch = setInterval(() => {
      peak = Math.max(peak, process.memoryUsage().rss);
    }, 10);
    const sender = spawn(
      process.execPath,
      ['-e', SENDER, `${test.url}${path}`, owner.cookie, String(bytes)],
      {
        stdio: ['ignore', 'pipe', 'inherit'],
      },
    );
    let said = '';
    sender.stdout.on('data', (chunk) => {
      said += chunk;
    });
    await once(sender, 'close');
    clearInterval(watch);
    return { status: said.trim(), grown: peak - before };
  };

  it('takes 40 MB without growing by 100 MB, and refuses more', async () => {
    await sendWatched(MEGABYTE);
    const full = await sendWatched(MAX_UPLOAD_BYTES);
    expect(full.status).toBe('202');
    expect(full.grown).toBeLessThan(100 * MEGABYTE);
    const over = await sendWatched(MAX_UPLOAD_BYTES + 1);
    expect(over.status).toMatch(/413|cut/);
    expect(over.grown).toBeLessThan(100 * MEGABYTE);
    const told = await post(
      Buffer.concat([await phonePhoto(), Buffer.alloc(MAX_UPLOAD_BYTES)]),
      'a.jpg',
    ).expect(413);
    expect(told.body).toMatchObject({ code: 'file-too-large', detail: expect.stringContaining('40 MB') });
  });

  it('leaves nothing on disk, also of an upload that breaks off', async () => {
    // Each module with uploads has one of its own.
    const folder = await test.app.select(SheetsModule).get(UploadInterceptor, { strict: true }).tempFolder();
    const temporaryFiles = () => readdir(folder);
    const { hostname, port } = new URL(test.url);
    const broken = request({
      hostname,
      port,
      path,
      method: 'POST',
      headers: { Cookie: owner.cookie, 'Content-Type': 'multipart/form-data; boundary=b' },
    });
    broken.on('error', () => undefined);
    broken.write('--b\r\nContent-Disposition: form-data; name="file"; filename="a.jpg"\r\n\r\n');
    broken.write(Buffer.alloc(MEGABYTE, 0xff));
    await until(async () => (await temporaryFiles()).length > 0);
    broken.destroy();
    await until(async () => (await temporaryFiles()).length === 0);
    // The door still stands.
    await post(await phonePhoto(), 'a.jpg').expect(202);
    await until(async () => (await temporaryFiles()).length === 0);
  });
});

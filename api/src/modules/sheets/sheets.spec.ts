import { eq } from 'drizzle-orm';
import sharp from 'sharp';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { addCompany, addPerson, endSessions, type TestPerson } from '../../../test/people.js';
import { planChanges, sheets } from '../../database/schema/index.js';
import { lockedPdf, pdf, phonePhoto, quarters } from '../../media/files.testkit.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { SheetsRepository } from './sheets.repository.js';
import { newJob, type SheetTest, settled, startSheetTest, until } from './sheets.testkit.js';

describe('sheets with a worker', () => {
  let test: SheetTest;
  let owner: TestPerson;
  let crew: TestPerson;
  let stranger: TestPerson;
  let jobId: string;
  beforeAll(async () => {
    test = await startSheetTest();
    const company = await addCompany(test);
    owner = await addPerson(test, company, 'owner');
    crew = await addPerson(test, company, 'crew');
    stranger = await addPerson(test, await addCompany(test), 'owner');
    await test.startWorker();
  });
  beforeEach(async () => {
    jobId = await newJob(owner.agent);
  });
  afterAll(() => test?.close());

  const upload = async (file: Buffer, name: string, fields: Record<string, string> = {}) => {
    const answer = await owner.agent
      .post(`/api/jobs/${jobId}/sheets`)
      .field({ view: 'photo', ...fields })
      .attach('file', file, name)
      .expect(202);
    return answer.body;
  };

  const onPlan = async (sheetId: string): Promise<{ id: string } | undefined> => {
    const { body } = await owner.agent.get(`/api/jobs/${jobId}/plan`).expect(200);
    return body.records.find(({ id }: { id: string }) => id === sheetId);
  };

  it('takes a photo through to an upright image, a thumbnail and a place in the plan', async () => {
    const sent = await upload(await phonePhoto(6), 'Garten hinten.JPG');
    expect(sent).toMatchObject({ name: 'Garten hinten', view: 'photo', status: 'uploaded', imageUrl: null });
    const sheet = await settled(owner.agent, sent.id);
    expect(sheet).toMatchObject({
      status: 'ready',
      failure: null,
      widthPx: 400,
      heightPx: 600,
      pageCount: null,
      pixelsPerPaperMeter: null,
      imageUrl: `/api/sheets/${sheet.id}/image`,
      thumbnailUrl: `/api/sheets/${sheet.id}/thumbnail`,
    });

    const image = await crew.agent.get(sheet.imageUrl!).buffer().expect(200);
    expect(image.headers).toMatchObject({
      'content-type': 'image/jpeg',
      'cache-control': 'private, no-cache',
      'x-content-type-options': 'nosniff',
      vary: expect.stringContaining('Cookie'),
    });
    const { width, exif, orientation } = await sharp(image.body).metadata();
    expect({ width, exif, orientation }).toEqual({ width: 400 });
    const thumbnail = await owner.agent.get(sheet.thumbnailUrl!).buffer().expect(200);
    expect((await sharp(thumbnail.body).metadata()).height).toBe(480);

    expect(await onPlan(sheet.id)).toMatchObject({
      kind: 'sheet',
      name: 'Garten hinten',
      order: 0,
      widthPx: 400,
      heightPx: 600,
      view: 'photo',
    });
    const list = await owner.agent.get('/api/jobs').expect(200);
    expect(list.body.items.find((item: { id: string }) => item.id === jobId).thumbnailUrl).toBe(
      sheet.thumbnailUrl,
    );
    // The original is deleted; only what was made of it stays.
    const kept = await until(async () => {
      const keys = (await test.stored()).filter((key) => key.includes(sheet.id));
      return keys.length === 2 && keys;
    });
    expect(kept.map((key) => key.split('/').at(-1)?.split('-')[0])).toEqual(['image', 'thumbnail']);
  });

  it('sends a file again only when it has changed, and never after sign-out', async () => {
    const reader = await addPerson(test, owner.actor.companyId, 'crew');
    const sheet = await settled(owner.agent, (await upload(await quarters().png().toBuffer(), 'a.png')).id);
    const first = await reader.agent.get(sheet.imageUrl!).expect(200);
    const again = await reader.agent
      .get(sheet.imageUrl!)
      .set('If-None-Match', first.headers.etag!)
      .expect(304);
    expect(again.text).toBe('');
    await stranger.agent.get(sheet.imageUrl!).set('If-None-Match', first.headers.etag!).expect(404);
    await endSessions(test, reader);
    await reader.agent.get(sheet.imageUrl!).set('If-None-Match', first.headers.etag!).expect(401);
  });

  it('draws the only page of a PDF, with the scale of its paper', async () => {
    const sheet = await settled(
      owner.agent,
      (await upload(pdf(1), 'Plot.pdf', { view: 'plan', name: 'Survey' })).id,
    );
    expect(sheet).toMatchObject({ name: 'Survey', status: 'ready', page: 1, pageCount: 1, widthPx: 2200 });
    expect(sheet.pixelsPerPaperMeter).toBeCloseTo(200 / 0.0254, 6);
  });

  it('offers the pages of a PDF with several, and draws the chosen one', async () => {
    const sent = await upload(pdf(3, 612, 792), 'Set.pdf', { view: 'plan' });
    const offered = await settled(owner.agent, sent.id);
    expect(offered).toMatchObject({ status: 'choose-page', pageCount: 3, page: null });
    const preview = await owner.agent.get(`/api/sheets/${sent.id}/pages/3`).buffer().expect(200);
    expect((await sharp(preview.body).metadata()).height).toBe(360);
    await owner.agent.get(`/api/sheets/${sent.id}/pages/4`).expect(404);
    await stranger.agent.get(`/api/sheets/${sent.id}/pages/1`).expect(404);

    const path = `/api/sheets/${sent.id}/page`;
    await owner.agent.post(path).send({ page: 4 }).expect(409);
    await crew.agent.post(path).send({ page: 2 }).expect(403);
    await stranger.agent.post(path).send({ page: 2 }).expect(404);
    await owner.agent.post(path).send({ page: 2 }).expect(202);
    const ready = await settled(owner.agent, sent.id);
    expect(ready).toMatchObject({ status: 'ready', page: 2, pageCount: 3, widthPx: 1700, heightPx: 2200 });
    await owner.agent.post(path).send({ page: 1 }).expect(409);
    await until(async () => (await test.stored()).every((key) => !key.includes(`${sent.id}/pages`)));
  });

  it('says why a file that kept its promise at the door can’t be read, and forgets it', async () => {
    const photo = await quarters().jpeg().toBuffer();
    const sent = await upload(photo.subarray(0, photo.length - 900), 'cut.jpg');
    const sheet = await settled(owner.agent, sent.id);
    expect(sheet).toMatchObject({ status: 'failed', canRetry: false, imageUrl: null });
    expect(sheet.failure).toContain('damaged');
    await owner.agent.post(`/api/sheets/${sent.id}/retry`).expect(409);
    await until(async () => (await test.stored()).every((key) => !key.includes(sent.id)));

    const locked = await settled(owner.agent, (await upload(lockedPdf(), 'l.pdf', { view: 'plan' })).id);
    expect(locked.failure).toContain('password');
    const long = await settled(owner.agent, (await upload(pdf(51), 'long.pdf', { view: 'plan' })).id);
    expect(long.failure).toContain('51 pages');
  });

  it('tries again when asked to, and puts the sheet into the plan once', async () => {
    const { id } = await upload(await phonePhoto(1), 'a.jpg');
    await settled(owner.agent, id);
    await owner.agent.post(`/api/sheets/${id}/retry`).expect(409);
    // As after a failure of ours: the file is still there, the sheet is not.
    const { companyId } = owner.actor;
    const original = `${companyId}/sheets/${id}/original`;
    await until(async () => !(await test.stored()).includes(original));
    await test.app.get(ObjectStorage, { strict: false }).put(original, await phonePhoto(1), 'image/jpeg');
    await test.database.queries
      .update(sheets)
      .set({ status: 'failed', failure: 'x', originalKey: original })
      .where(eq(sheets.id, id));
    expect((await owner.agent.get(`/api/sheets/${id}`).expect(200)).body.canRetry).toBe(true);
    await owner.agent.post(`/api/sheets/${id}/retry`).expect(202);
    expect(await settled(owner.agent, id)).toMatchObject({ status: 'ready', failure: null });
    const changes = await test.database.queries
      .select()
      .from(planChanges)
      .where(eq(planChanges.jobId, jobId));
    expect(changes.filter(({ put }) => Object.hasOwn(put as object, id))).toHaveLength(1);
  });

  it('renames and removes a sheet, and keeps the image for earlier versions of the plan', async () => {
    const { id } = await upload(await phonePhoto(1), 'a.jpg');
    const sheet = await settled(owner.agent, id);
    const renamed = await owner.agent.patch(`/api/sheets/${id}`).send({ name: 'Front' }).expect(200);
    expect(renamed.body.name).toBe('Front');
    expect(await onPlan(id)).toMatchObject({ kind: 'sheet', name: 'Front' });
    await crew.agent.patch(`/api/sheets/${id}`).send({ name: 'Mine' }).expect(403);
    await stranger.agent.delete(`/api/sheets/${id}`).expect(404);
    await owner.agent.delete(`/api/sheets/${id}`).expect(204);
    await owner.agent.delete(`/api/sheets/${id}`).expect(404);
    expect((await owner.agent.get(`/api/jobs/${jobId}/sheets`).expect(200)).body.items).toEqual([]);
    expect(await onPlan(id)).toBeUndefined();
    await owner.agent.get(sheet.imageUrl!).expect(200);
  });

  it('keeps uploads to planners of the company, before it reads them', async () => {
    const photo = await phonePhoto(1);
    const post = (person: TestPerson) =>
      person.agent.post(`/api/jobs/${jobId}/sheets`).field('view', 'photo').attach('file', photo, 'a.jpg');
    await post(crew).expect(403);
    await post(stranger).expect(404);
    await owner.agent.post(`/api/jobs/${jobId}/archive`).expect(200);
    expect((await post(owner).expect(409)).body.code).toBe('job-archived');
  });
});

describe('a sheet that is no longer wanted', () => {
  let test: SheetTest;
  let owner: TestPerson;
  beforeAll(async () => {
    test = await startSheetTest();
    owner = await addPerson(test, await addCompany(test), 'owner');
    await test.startWorker();
  });
  afterAll(() => test?.close());

  it('stops while it is being made, and leaves nothing behind', async () => {
    const jobId = await newJob(owner.agent);
    // Every page of it is drawn for the picker: that takes a while.
    const sent = await owner.agent
      .post(`/api/jobs/${jobId}/sheets`)
      .field('view', 'plan')
      .attach('file', pdf(50, 3000, 3000), 'a.pdf')
      .expect(202);
    const { id } = sent.body;
    const status = async () => (await owner.agent.get(`/api/sheets/${id}`).expect(200)).body.status;
    await until(async () => (await status()) === 'processing');
    await owner.agent.delete(`/api/sheets/${id}`).expect(204);
    // The worker is free for the next one at once.
    const next = await owner.agent
      .post(`/api/jobs/${jobId}/sheets`)
      .field('view', 'photo')
      .attach('file', await phonePhoto(), 'b.jpg')
      .expect(202);
    expect(await settled(owner.agent, next.body.id)).toMatchObject({ status: 'ready' });
    await until(async () => (await test.stored()).every((key) => !key.includes(id)));
    const [row] = await test.database.queries.select().from(sheets).where(eq(sheets.id, id));
    expect(row).toMatchObject({ status: 'processing', pageCount: null, imageKey: null });
    expect(row?.archivedAt).not.toBeNull();
  });
});

describe('sheets without a worker', () => {
  let test: SheetTest;
  let owner: TestPerson;
  beforeAll(async () => {
    test = await startSheetTest();
    owner = await addPerson(test, await addCompany(test), 'owner');
  });
  afterAll(() => test?.close());

  const upload = async () => {
    const answer = await owner.agent
      .post(`/api/jobs/${await newJob(owner.agent)}/sheets`)
      .field('view', 'photo')
      .attach('file', await phonePhoto(), 'a.jpg')
      .expect(202);
    return answer.body.id as string;
  };

  it('lets one worker at a time at a sheet, and others at others', async () => {
    const repository = test.app.get(SheetsRepository, { strict: false });
    const done: string[] = [];
    await repository.alone('one', async () => {
      await repository.alone('one', async () => {
        done.push('one, meanwhile');
      });
      await repository.alone('another', async () => {
        done.push('another');
      });
      done.push('one');
    });
    await repository.alone('one', async () => {
      done.push('one, afterwards');
    });
    await expect(repository.alone('one', () => Promise.reject(new Error('failed')))).rejects.toThrow(
      'failed',
    );
    await repository.alone('one', async () => {
      done.push('one, after a failure');
    });
    expect(done).toEqual(['another', 'one', 'one, afterwards', 'one, after a failure']);
  });

  it('cancels a sheet that waits, deletes its file, and takes up what a killed worker left', async () => {
    const cancelled = await upload();
    const orphan = await upload();
    // As a worker leaves it that is killed half-way: begun, and its job no longer in the queue.
    await test.database.queries.update(sheets).set({ status: 'processing' }).where(eq(sheets.id, orphan));
    await test.database.executeSql(`DELETE FROM pgboss.job WHERE name = 'sheet.process'`);
    await owner.agent.delete(`/api/sheets/${cancelled}`).expect(204);
    await owner.agent.get(`/api/sheets/${cancelled}`).expect(404);

    await test.startWorker();
    expect(await settled(owner.agent, orphan)).toMatchObject({ status: 'ready' });
    await until(async () => (await test.stored()).every((key) => !key.includes(cancelled)));
    const [row] = await test.database.queries.select().from(sheets).where(eq(sheets.id, cancelled));
    expect(row).toMatchObject({ status: 'uploaded', imageKey: null });
  });
});

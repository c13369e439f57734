import { type Browser, expect, type Page, test } from '@playwright/test';
import { phone } from './playwright.config.js';
import { CardPage } from './support/card-page.js';
import { HomePage } from './support/home-page.js';
import { jobIdOf } from './support/jobs.js';
import { mailTo } from './support/mail.js';
import { paperOf } from './support/papers.js';
import { signIn } from './support/people.js';
import { PlanPage } from './support/plan-page.js';
import { PricePage } from './support/price-page.js';
import { ProposalPage } from './support/proposal-page.js';
import { centsOf, dollars, sumOf, textOf } from './support/sums.js';

/** The demo company's job with a photo: three groups of lights, of which two are offered, and three faults. */
const job = /^Harrow Bank/;
const designer = {
  name: 'Corin Aldous',
  email: 'designer@fernhollow.example',
  password: 'fernhollow-demo',
};
const client = 'maren.holloway@example.com';
const signature = 'Maren E. Holloway';

/** Where they stand on the photo. */
const p3 = { x: 1154, y: 938 };
const u4 = { x: 152, y: 824 };

const question = 'Could this one stand further from the stones? The mower passes there.';
const answer = 'Yes: we have moved it a hand to the left.';

/** Somebody with a phone, who has no account. */
async function onPhone(browser: Browser): Promise<Page> {
  const context = await browser.newContext({ viewport: phone, hasTouch: true, isMobile: true });
  return context.newPage();
}

test('from plan to yes', async ({ page, browser }) => {
  test.setTimeout(300_000);
  const price = new PricePage(page);
  const proposal = new ProposalPage(page);
  const plan = new PlanPage(page);

  const jobId = await test.step('the price of the plan', async () => {
    await signIn(page, designer);
    await page.getByRole('link', { name: job }).click();
    await expect(page.getByRole('heading', { level: 1, name: job })).toBeVisible();
    await page.getByRole('link', { name: 'Price', exact: true }).click();
    await price.isOpen();
    const [subtotal, tax, total] = await Promise.all([
      centsOf(sumOf(price.sums, /^Subtotal/)),
      centsOf(sumOf(price.sums, /^Sales tax/)),
      centsOf(price.total),
    ]);
    expect(total).toBe(subtotal + tax);
    const deposit = await centsOf(sumOf(price.sums, /^Deposit/));
    expect(deposit).toBe(Math.round(total * 0.3));
    return jobIdOf(page);
  });

  await test.step('one line by a price of our own, another written by hand', async () => {
    const first = await centsOf(price.total);
    const aiming = await centsOf(price.priceOf('Aiming after dark'));
    await price.override('Aiming after dark', '150.00', 'We are in the street that evening anyway');
    const second = await price.totalOtherThan(first);
    // Labour is not taxed here, so that the total follows to the cent.
    expect(second).toBe(first - aiming + 150_00);
    await expect(price.line('Aiming after dark')).toContainText('changed by hand');
    await price.addLabourByHand('Trimming the shrubs', '80.00');
    const third = await price.totalOtherThan(second);
    expect(third).toBe(second + 80_00);
    await expect(price.line('Trimming the shrubs')).toContainText('written by hand');
    await price.saved();
    await page.reload();
    await price.isOpen();
    expect(await centsOf(price.total)).toBe(third);
  });

  await test.step('each fault is accepted in writing before a proposal can be made', async () => {
    await expect(price.sums.getByRole('button', { name: 'Make the proposal' })).toBeDisabled();
    await expect(price.sums).toContainText('3 faults of the plan are neither mended nor accepted');
    await price.part('Faults');
    await expect(price.openFaults()).toHaveCount(3);
    for (const why of [
      'Within the lamp’s own tolerance; the client keeps the old lamps',
      'The same for the last lamp of the path',
      'The wall wash gets an LED lamp before its first winter',
    ])
      await price.acceptFirst(why);
    await price.onward.click();
  });

  const phonePage = await onPhone(browser);
  const home = new HomePage(phonePage);
  let link = '';

  await test.step('made, and sent', async () => {
    await expect(proposal.standing).toContainText('A revision freezes the plan and the price');
    await proposal.make(1);
    await proposal.send(1);
    await expect(page.getByText('Sent to Maren Holloway.')).toBeVisible();
    await expect(proposal.standing).toContainText('Nobody has opened it yet.');
  });

  await test.step('the mail brings the paper and the link', async () => {
    const mail = await mailTo(page.request, client, { subject: /^Your proposal for Harrow Bank/ });
    const paper = await paperOf(page.request, mail);
    for (const sum of [/^Total/, /^Sales tax/, /^Deposit/, /^Start of work/, /^Balance/])
      expect(paper).toContain(await textOf(proposal.sum(sum)));
    expect(paper).toContain('Copper path light, G4 lamp');

    await phonePage.goto('/dev/mail');
    await phonePage.getByRole('link', { name: mail.subject }).first().tap();
    await expect(phonePage.getByRole('link', { name: /^proposal-\d+-1\.pdf$/ })).toBeVisible();
    const toPage = phonePage.getByRole('link', { name: /\/p\// }).first();
    link = await textOf(toPage);
    await toPage.tap();
    await home.isOpen();
    await expect(home.total).toHaveText(await textOf(proposal.sum(/^Total/)));
  });

  const sent = await sentBy(page, jobId);
  const totalOf = (...names: string[]): string => dollars(sent.totalOf(names));

  await test.step('only a person’s touch counts as opened', async () => {
    await proposal.open(jobId);
    await proposal.stands('Sent');
    await home.tapLight('P3');
    await expect(home.card('P3')).toContainText('Part of “Path to the patio”.');
    await expect
      .poll(async () => {
        await page.reload();
        return proposal.standing.textContent();
      })
      .toContain('was opened by Maren Holloway');
  });

  await test.step('groups are switched, and the sums follow', async () => {
    await expect(home.total).toHaveText(totalOf('Path to the patio', 'Shrub bed'));
    await home.group('Shrub bed').tap();
    await expect(home.total).toHaveText(totalOf('Path to the patio'));
    await home.group('Wall and tree').tap();
    await expect(home.total).toHaveText(totalOf('Path to the patio', 'Wall and tree'));
    await home.group('Shrub bed').tap();
    await expect(home.total).toHaveText(totalOf('Path to the patio', 'Shrub bed', 'Wall and tree'));
    await home.group('Wall and tree').tap();
    await expect(home.total).toHaveText(totalOf('Path to the patio', 'Shrub bed'));
  });

  await test.step('a question about a light', async () => {
    await home.card('P3').getByRole('button', { name: 'Ask about this light' }).tap();
    await home.main.getByLabel('Ask Fernhollow Outdoor Lighting').fill(question);
    await home.main.getByRole('button', { name: 'Send question' }).tap();
    await expect(home.thread(/^About .*P3/)).toContainText(question);
    await expect(home.thread(/^About .*P3/)).toContainText('Waiting for an answer');
  });

  await test.step('reaches the designer by mail, beside the proposal and on the plan', async () => {
    await mailTo(page.request, designer.email, { subject: /^Maren Holloway asks about Harrow Bank/ });
    await proposal.open(jobId);
    await proposal.stands('Question asked');
    await expect(proposal.standing.getByRole('button', { name: 'Answer 1 question' })).toBeVisible();
    await expect(proposal.questions).toContainText(question);
    await page.getByRole('link', { name: 'Plan', exact: true }).click();
    await plan.isOpen();
    await page.getByRole('button', { name: `Question about Light P3: ${question}` }).click();
    const panel = page.getByRole('region', { name: 'Questions' });
    await panel.getByLabel('Your answer about Light P3').fill(answer);
    await panel.getByRole('button', { name: 'Send the answer' }).click();
    await expect(panel.getByRole('listitem').filter({ hasText: answer }).first()).toBeVisible();
    await panel.getByRole('button', { name: 'Settle: Light P3' }).click();
    await expect(page.getByRole('button', { name: /^Question about/ })).toHaveCount(0);
    await panel.getByRole('button', { name: 'Close: Questions' }).click();
    await plan.lookAt(p3, 1.5);
    await plan.drag(p3, { x: p3.x - 18, y: p3.y });
    await plan.saved();
  });

  await test.step('the changed plan becomes revision 2', async () => {
    await proposal.open(jobId);
    await expect(proposal.standing).toContainText('The plan or the price has changed since revision 1.');
    await proposal.make(2);
    await expect(proposal.preview).toContainText('What changed since revision 1');
    await expect(proposal.preview.getByRole('listitem')).toHaveText(/^P3 moved by /);
    await proposal.send(2);
  });

  await test.step('the homeowner has the answer and the new revision', async () => {
    await mailTo(page.request, client, { subject: /^An answer to your question/ });
    await mailTo(page.request, client, { subject: /^Your proposal/, file: /^proposal-\d+-2\.pdf$/ });
    await phonePage.reload();
    await home.isOpen();
    await expect(home.main).toContainText('revision 2');
    await expect(home.thread(/^About .*P3/)).toContainText(answer);
    await expect(home.thread(/^About .*P3/)).toContainText('Answered');
  });

  const second = await sentBy(page, jobId);
  const all = ['Path to the patio', 'Shrub bed', 'Wall and tree'];
  const agreed = second.totalOf(all);

  await test.step('the homeowner adds a group and approves', async () => {
    await home.group('Wall and tree').tap();
    await home.review();
    await expect(home.total).toHaveText(dollars(agreed));
    await home.main.getByRole('button', { name: /^Approve for/ }).tap();
    await expect(home.main).toContainText('Please confirm that you approve.');
    await home.sign(signature, dollars(agreed));
  });

  await test.step('the signed paper goes to both sides', async () => {
    const copy = await mailTo(page.request, client, {
      subject: /^Your copy: proposal \d+, revision 2, approved$/,
    });
    const told = await mailTo(page.request, designer.email, { subject: /^Harrow Bank.* is approved/ });
    expect(told.subject).toContain(dollars(agreed));
    for (const mail of [copy, told]) {
      const paper = await paperOf(page.request, mail);
      expect(paper).toContain(signature);
      expect(paper).toMatch(/I approve proposal \d+, revision 2, of Fernhollow Outdoor Lighting/);
      expect(paper).toContain(dollars(agreed));
    }
  });

  const deposit = Math.round(agreed * 0.3);
  await test.step('the company sees the yes, and what is owed next', async () => {
    await proposal.open(jobId);
    await proposal.stands('Approved');
    await expect(proposal.section('Approval')).toContainText(signature);
    await page.goto('/board');
    const prepare = page.getByRole('region', { name: /^Prepare/ });
    await expect(prepare.getByRole('listitem').filter({ hasText: job })).toContainText('ClientPay: Deposit');
  });

  const cardPage = new CardPage(phonePage);
  await test.step('a declined card, and another try', async () => {
    await home.main.getByRole('button', { name: `Pay ${dollars(deposit)} by card` }).tap();
    await cardPage.asksFor(dollars(deposit));
    await cardPage.pay('A card that is declined');
    await expect(phonePage.getByRole('alert')).toContainText('The card was declined. Nothing was charged.');
    await phonePage.getByRole('link', { name: 'Back without paying' }).tap();
    await home.isOpen();
    await expect(home.main).toContainText('A card payment was begun and is not finished.');
    await home.main.getByRole('button', { name: 'Go on with the payment' }).tap();
    await cardPage.asksFor(dollars(deposit));
  });

  await test.step('one that works, of which word comes twice', async () => {
    await cardPage.pay('Works; word of it comes twice');
    await home.isOpen();
    await expect(home.main).toContainText('Paid, thank you. The receipt comes by mail.', { timeout: 20_000 });
    const receipt = await mailTo(page.request, client, { subject: /^Receipt \d+ from Fernhollow/ });
    expect(await paperOf(page.request, receipt)).toContain(dollars(deposit));
    await proposal.open(jobId);
    await expect(proposal.payments).toContainText(
      `Agreed ${dollars(agreed)}, paid ${dollars(deposit)}, still to pay ${dollars(agreed - deposit)}.`,
    );
    const cameIn = proposal.payments.getByRole('table', { name: 'Payments that came in' });
    await expect(cameIn.getByRole('row').filter({ hasText: dollars(deposit) })).toHaveCount(1);
    await expect(proposal.payments.getByRole('link', { name: /^Receipt \d+/ })).toHaveCount(1);
  });

  await test.step('the job has moved on, and its timeline tells it all', async () => {
    await page.goto(`/jobs/${jobId}`);
    await expect(page.getByLabel('Stage', { exact: true })).toHaveValue('prepare');
    const timeline = page.getByRole('region', { name: 'Timeline' });
    await timeline.getByRole('button', { name: /earlier events?$/ }).click();
    for (const sentence of [
      /^Accepted in writing: F1 gets/,
      /^Revision 1 was made/,
      /^Revision 1 was sent to /,
      /^Revision 1 was opened by a person/,
      /^A question about P3/,
      /^An answer about P3/,
      /^Revision 2 was sent to /,
      /^Revision 2 was approved/,
      /^Moved from Propose to Prepare/,
      /^Deposit was paid by card/,
    ])
      await expect(timeline.getByText(sentence).first()).toBeVisible();
  });

  await test.step('a light more: a change order of the difference only', async () => {
    await plan.open(jobId);
    const place = { x: u4.x + 60, y: u4.y + 40 };
    await plan.lookAt(u4, 1.5);
    await plan.tool('Fixture');
    await plan.pick('Copper up-light, 4 W, 36°');
    await plan.click(place);
    await plan.drawCable([u4, place]);
    await plan.saved();
    await page.goto(`/jobs/${jobId}/price?part=groups`);
    await price.isOpen();
    await page.getByLabel('Group of U9').selectOption({ label: 'Shrub bed' });
    await price.saved();
    await expect(price.onward).toBeVisible();
    await price.onward.click();
    await expect(proposal.standing).toContainText('The plan or the price has changed since revision 2.');
    await proposal.make(3, true);
    await expect(proposal.preview).toContainText('What changes against revision 2, which is approved');
    await expect(proposal.preview).toContainText('U9 added: Copper up-light, 4 W, 36°');
    await proposal.send(3, true);
  });

  const third = await sentBy(page, jobId);
  const more = third.totalOf(all) - agreed;

  await test.step('the homeowner sees what is different, and approves that', async () => {
    const mail = await mailTo(page.request, client, { subject: /^Your change order for Harrow Bank/ });
    expect(await paperOf(page.request, mail)).toContain(dollars(third.totalOf(all)));
    await phonePage.reload();
    await home.isOpen();
    await expect(home.main).toContainText('A change to what you approved');
    await expect(home.changes).toContainText('U9, Copper up-light, 4 W, 36°');
    await expect(home.changes).toContainText(
      `The total goes from ${dollars(agreed)} to ${dollars(agreed + more)}: ${dollars(more)} more.`,
    );
    await expect(home.light('U9')).toHaveAccessibleName(/, new/);
    await home.review();
    await expect(home.main).toContainText(
      `You approved ${dollars(agreed)} before. This is ${dollars(more)} more.`,
    );
    await home.sign(signature, dollars(agreed + more));
    const copy = await mailTo(page.request, client, {
      subject: /^Your copy: change order \d+, revision 3, approved$/,
    });
    expect(await paperOf(page.request, copy)).toContain(dollars(agreed + more));
  });

  await test.step('only the difference is due for it', async () => {
    await proposal.open(jobId);
    await expect(proposal.payments).toContainText(
      `Agreed ${dollars(agreed + more)}, paid ${dollars(deposit)}, still to pay ${dollars(agreed + more - deposit)}.`,
    );
    const owed = proposal.payments.getByRole('table', { name: 'What is owed' });
    await expect(owed.getByRole('row').filter({ hasText: /^Change order/ })).toContainText(dollars(more));
  });

  await test.step('a link that is called back, and one that was guessed', async () => {
    await proposal
      .section('Links')
      .getByRole('button', { name: 'More for the link of Maren Holloway' })
      .click();
    await page.getByRole('menuitem', { name: 'Revoke the link…' }).click();
    await page.getByRole('button', { name: 'Revoke it' }).click();
    await expect(page.getByText('The link is revoked.')).toBeVisible();
    expect((await phonePage.goto(link))?.status()).toBe(410);
    await expect(phonePage.getByRole('heading', { name: 'This link is no longer valid' })).toBeVisible();
    await expect(phonePage.locator('body')).not.toContainText('Harrow Bank');
    expect((await phonePage.goto(`/p/${'A'.repeat(43)}`))?.status()).toBe(404);
    await expect(
      phonePage.getByRole('heading', { name: 'There is no proposal at this address' }),
    ).toBeVisible();
  });
  await phonePage.context().close();
});

interface Sent {
  /** In cents, of the base and groups by their names: as the server worked it out for the page. */
  totalOf(names: readonly string[]): number;
}

/** What was frozen in the newest revision. */
async function sentBy(page: Page, jobId: string): Promise<Sent> {
  const read = async (path: string) => {
    const answer = await page.request.get(`/api/jobs/${jobId}/proposal${path}`);
    expect(answer.status()).toBe(200);
    return answer.json();
  };
  const { revisions } = (await read('')) as { revisions: { id: string }[] };
  const { document } = (await read(`/revisions/${revisions[0]!.id}`)) as {
    document: {
      price: {
        groups: { id: string | null; name: string }[];
        combinations: { groups: string[]; totalMinor: number }[];
      };
    };
  };
  const { groups, combinations } = document.price;
  return {
    totalOf: (names) => {
      const ids = names.map((name) => groups.find((group) => group.name === name)!.id);
      const found = combinations.find(
        (one) => one.groups.length === ids.length && ids.every((id) => one.groups.includes(id!)),
      );
      return found!.totalMinor;
    },
  };
}

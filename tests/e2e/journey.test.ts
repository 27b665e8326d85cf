import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, expect, it } from 'vitest';
import { demoPassword, demoPeople } from '../../server/scripts/demo/people.ts';
import { accessibilityFaults, launchBrowser, sidewaysScroll, signIn, type Visitor, visit } from '../support/browser.ts';
import { awaitMail, pathIn } from '../support/mails.ts';
import { type Product, startProduct } from '../support/product.ts';

// One journey in order: each step stands on the one before, as the people's work does.

let product: Product;
let browser: Browser;
let engineer: Visitor;
let manager: Visitor;
let auditor: Visitor;
let studyPath = '';
let submissionPath = '';

const csv = readFileSync(join(import.meta.dirname, '../../server/scripts/demo/heated-wall-run-7.csv'));

beforeAll(async () => {
  product = await startProduct();
  browser = await launchBrowser();
  engineer = await visit(browser, product.address);
  manager = await visit(browser, product.address);
  auditor = await visit(browser, product.address);
});

afterAll(async () => {
  await browser?.close();
  await product?.stop();
});

// What each person saw when a step failed.
afterEach(async ({ task }) => {
  if (task.result?.state !== 'fail') return;
  for (const [name, visitor] of Object.entries({ engineer, manager, auditor })) {
    await visitor.page.screenshot({ path: join(import.meta.dirname, `../../.stemma/failed-${name}.png`) });
  }
});

/** The open panel of the inspector. */
const inspector = (page: Page) => page.getByRole('complementary', { name: /.+/ });

/** Types a value and its uncertainty into a quantity field; a spread in per cent is relative whatever the form. */
async function enter(page: Page, label: string, value: string, spread: string): Promise<void> {
  const field = page.getByRole('group', { name: label, exact: true });
  await field.getByRole('textbox').first().fill(value);
  await field.getByRole('textbox').last().fill(spread);
  await field.getByText(/^= .*\(k = 2\)/).waitFor();
}

async function enterAtPoint(page: Page, label: string, value: string, spread: string): Promise<void> {
  await page.getByLabel('Add an entry').selectOption({ label });
  await enter(page, label, value, spread);
}

/** Opens a quantity from the canvas by keyboard. */
async function openQuantity(page: Page, name: string): Promise<void> {
  const node = page.getByRole('group', { name: new RegExp(name) }).first();
  await node.waitFor();
  await node.focus();
  await page.keyboard.press('Enter');
  await inspector(page).getByRole('heading', { name, exact: true }).waitFor();
}

async function contents(page: Page): Promise<void> {
  const button = page.getByRole('button', { name: 'Contents' });
  if ((await button.getAttribute('aria-pressed')) !== 'true') await button.click();
  await page.getByRole('heading', { name: 'Operating points' }).waitFor();
}

async function saved(page: Page): Promise<void> {
  await page.getByText(/^(Saved|All changes saved)/).waitFor();
}

async function expectAccessible(page: Page): Promise<void> {
  expect(await accessibilityFaults(page)).toEqual([]);
}

it('an engineer signs in and starts a study from the quantity the plant needs', async () => {
  const { page } = engineer;
  await page.goto('/');
  await signIn(engineer, demoPeople.engineer.email, demoPassword);

  await page.getByRole('link', { name: 'Studies' }).click();
  await page.getByRole('button', { name: 'New study' }).click();
  await page.getByLabel('Title').fill('Cooler tube, wall transfer');
  await page.getByLabel('Question').fill('What is k at the wall of the cooler tube?');
  await page.getByRole('button', { name: 'Create the study' }).click();
  await page.getByRole('heading', { name: 'Start from the quantity the plant needs' }).waitFor();
  studyPath = new URL(page.url()).pathname;

  await page.getByLabel('Name').fill('Wall mass-transfer coefficient');
  await page.getByLabel('Symbol').fill('k_w');
  await page.getByLabel('Unit shown').fill('m/s');
  await page.getByRole('button', { name: 'Add the quantity' }).click();
  await page
    .getByRole('group', { name: /Wall mass-transfer coefficient/ })
    .first()
    .waitFor();
  await saved(page);
});

it('describes plant and rig, and the groups follow as she types', async () => {
  const { page } = engineer;
  await contents(page);
  await page.getByRole('button', { name: 'Plant', exact: true }).click();
  await page.getByLabel('Name', { exact: true }).fill('Cooler tube');
  await enterAtPoint(page, 'L, characteristic length', '40 mm', '0.1 mm');
  await enterAtPoint(page, 'u, velocity', '0.46', '1.5 %');
  await enterAtPoint(page, 'ν, kinematic viscosity', '6.8×10⁻⁷ m²/s', '2 %');
  await inspector(page).getByText('u L / nu').waitFor();
  await enterAtPoint(page, 'D, diffusion coefficient', '6.5e-10 m2/s', '7 %');
  await saved(page);

  await contents(page);
  await page.getByRole('button', { name: 'Add an operating point at bench scale' }).click();
  await page.getByLabel('Name', { exact: true }).fill('Heated rig');
  await enterAtPoint(page, 'L, characteristic length', '20,00 mm', '0.05 mm');
  await enterAtPoint(page, 'ρ, density', '994 kg/m3', '0.1 %');
  await enterAtPoint(page, 'μ, dynamic viscosity', '0.719', '1 %');
  await enterAtPoint(page, 'c_p, specific heat capacity', '4178', '0.2 %');
  await enterAtPoint(page, 'λ, thermal conductivity', '0.6205', '1 %');
  await saved(page);

  // Water at 35 °C: Pr 4.84 (IAPWS; tests/reference/README.md says where such values come from).
  await inspector(page)
    .getByRole('row', { name: /Pr.*4\.84/ })
    .waitFor();
});

it('uploads the readings of the rig and gets h with type A and type B apart', async () => {
  const { page } = engineer;
  await contents(page);
  await page.getByRole('link', { name: '+ Upload readings' }).click();
  await page.getByRole('heading', { name: 'New test from steady readings' }).waitFor();

  // A row with a unit mistake first: it is named by row and column, and nothing is lost.
  await page.getByLabel('or paste them here').fill(csv.toString('utf8').replace('41.0', 'n/a'));
  await page.getByText(/n\/a/).first().waitFor();
  await page.getByLabel(/File \(CSV/).setInputFiles({ name: 'run-7.csv', mimeType: 'text/csv', buffer: csv });
  await page.getByLabel('Name of the test').fill('Run 7');
  await page.getByLabel('Operating point').selectOption({ label: 'Heated rig (bench)' });
  for (const [instrument, spread] of [
    ['heater power', '8.8 W'],
    ['wall temperature', '0.1 K'],
    ['bulk temperature', '0.08 K'],
    ['flow', '1 %'],
  ]) {
    await page.getByLabel(`Type B uncertainty of the ${instrument}`).fill(spread ?? '');
  }
  await enter(page, 'Heat loss', '26 W', '8 W');
  await enter(page, 'Heated length', '1.2', '2 mm');
  await page
    .getByText(/Type A/)
    .first()
    .waitFor();
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Add the test to the study' }).click();

  await page.getByRole('heading', { name: 'Run 7 is in the study' }).waitFor();
  await page.getByRole('button', { name: 'Use as h' }).click();
  await page.getByRole('heading', { name: 'Run 7' }).first().waitFor();
  // Gnielinski gives 4800 W/(m² K) for water at Re 25 000 in this tube, within its 10 %.
  await page
    .getByText(/4\.8\d.*±/)
    .first()
    .waitFor();
});

it('links h over a heat analogue to k at the plant, adds a correlation and adopts', async () => {
  const { page } = engineer;
  await openQuantity(page, 'Wall mass-transfer coefficient');
  await page.getByRole('button', { name: '+ Heat analogue' }).click();
  await page.getByLabel('Measured heat-transfer coefficient').selectOption({ index: 1 });
  await page
    .getByText(/Re is .* at/)
    .first()
    .waitFor();
  await expectAccessible(page);
  await saved(page);
  // The window itself never scrolls: canvas and inspector do.
  expect(await page.evaluate(() => document.documentElement.scrollHeight - window.innerHeight)).toBeLessThanOrEqual(0);

  await openQuantity(page, 'Wall mass-transfer coefficient');
  await page.getByRole('button', { name: '+ Correlation' }).click();
  await page.getByLabel('Method').selectOption({ label: 'Linton-Sherwood, dissolving tube wall (Sh)' });
  await page.getByRole('button', { name: /^Add/ }).last().click();
  await page
    .getByRole('heading', { name: /Linton-Sherwood/ })
    .first()
    .waitFor();
  await page
    .getByText(/Sc is .*Cooler tube/)
    .first()
    .waitFor();
  await saved(page);

  await openQuantity(page, 'Wall mass-transfer coefficient');
  await page.getByRole('button', { name: 'Adopt Heat analogue' }).click();
  await page.getByText('adopted', { exact: true }).waitFor();
  await saved(page);
});

it('turns k into a length by a balance, and refuses a formula whose units do not fit', async () => {
  const { page } = engineer;
  await contents(page);
  await page.getByRole('button', { name: '+ Add a quantity' }).click();
  const form = page.getByRole('form', { name: 'Add a quantity' });
  await form.getByLabel('Name').fill('Length for one transfer unit');
  await form.getByLabel('Symbol').fill('L_1');
  await form.getByLabel('Unit shown').fill('m');
  await form.getByLabel('Operating point').selectOption({ label: 'Cooler tube' });
  await form.getByRole('button', { name: 'Add the quantity' }).click();
  await page.getByRole('button', { name: '+ Balance' }).click();
  await page.getByLabel('L_1 =').fill('d * u / (4 * k)');
  await page.getByRole('button', { name: /^Add/ }).last().click();
  await page.getByLabel('d is').selectOption({ label: 'L, characteristic length' });
  await page.getByLabel('u is').selectOption({ label: 'u, velocity' });
  await page.getByLabel('k is').selectOption({ label: 'k_w, Wall mass-transfer coefficient' });
  // 0.04 m · 0.46 m/s / (4 · 1.61e-5 m/s) = 286 m
  await inspector(page)
    .getByText(/2[78]\d|29\d/)
    .first()
    .waitFor();

  await page.getByLabel('L_1 =').fill('d * u / (4 * k) + u');
  await page
    .getByText(/Cannot add .*u \(m\/s\)/)
    .first()
    .waitFor();
  await page.getByLabel('L_1 =').fill('d * u / (4 * k)');
  await saved(page);
  await expectAccessible(page);
});

it('cannot submit before it is ready, is told why, and then submits', async () => {
  const { page } = engineer;
  await page.getByRole('link', { name: 'Members' }).click();
  await page.getByLabel('Person').selectOption({ label: `${demoPeople.manager.name} (${demoPeople.manager.email})` });
  await page.getByLabel('Role').selectOption({ label: 'technical manager' });
  await page.getByRole('button', { name: 'Add the member' }).click();
  await page.getByText('rules on assumptions, signs or returns').waitFor();
  await expectAccessible(page);
  await page.getByRole('link', { name: 'Chain' }).click();

  await page.getByRole('button', { name: 'Submit for review' }).click();
  const dialog = page.getByRole('dialog', { name: 'Submit for review' });
  await dialog.getByLabel('Target quantity').selectOption({ label: 'L_1, Length for one transfer unit' });
  await dialog.getByText('Not ready yet').waitFor();
  await expectAccessible(page);
  await dialog.getByRole('button', { name: 'Mend it' }).first().click();

  const open = page.getByLabel(/^Why it holds here/);
  await open.first().waitFor();
  for (let index = 0; index < (await open.count()); index += 1) {
    await open.nth(index).fill('Checked with the rig team; the difference is small and corrected.');
  }
  await saved(page);
  await page.getByRole('button', { name: 'Submit for review' }).click();
  await dialog.getByLabel('Target quantity').selectOption({ label: 'L_1, Length for one transfer unit' });
  await dialog.getByLabel('Note to the technical manager').fill('For the cooler layout.');
  await dialog.getByRole('button', { name: 'Submit for review' }).click();
  await page
    .getByRole('dialog', { name: 'Submitted for review' })
    .getByRole('link', { name: 'Open the review' })
    .click();
  await page.getByRole('heading', { name: 'Review of Length for one transfer unit' }).waitFor();
  submissionPath = new URL(page.url()).pathname;
  await page.getByText('Only a technical manager of this study may rule').waitFor();
});

it('the manager gets a mail that leads to the review, rules on each assumption and signs with the password', async () => {
  const { page } = manager;
  const mail = await awaitMail(product.mailAddress, demoPeople.manager.email, 'Length for one transfer unit waits');
  expect(pathIn(mail)).toBe(submissionPath);
  await page.goto(pathIn(mail));
  await signIn(manager, demoPeople.manager.email, demoPassword);
  await page.getByRole('heading', { name: 'Review of Length for one transfer unit' }).waitFor();
  await expectAccessible(page);

  const sign = page.getByRole('form', { name: 'Sign' });
  await sign.getByText(/Rule on every assumption first/).waitFor();
  const rulings = page.getByRole('form', { name: /^Ruling on/ });
  const count = await rulings.count();
  for (let index = 0; index < count; index += 1) {
    await rulings.nth(index).getByRole('radio', { name: 'accepted', exact: true }).click();
    await page.getByText(`${index + 1} of ${count} ruled on`).waitFor();
  }

  await sign.getByLabel('Your password').fill('not my password at all');
  await sign.getByRole('button', { name: 'Sign' }).click();
  await sign.getByText('This is not your password, so nothing was signed.').waitFor();
  await sign.getByLabel('Your password').fill(demoPassword);
  await sign.getByRole('button', { name: 'Sign' }).click();
  await page.getByRole('heading', { name: `Signed by ${demoPeople.manager.name}` }).waitFor();

  const answer = await awaitMail(
    product.mailAddress,
    demoPeople.engineer.email,
    'Length for one transfer unit is signed',
  );
  expect(answer.text).toContain(demoPeople.manager.name);
  await expectAccessible(page);
});

it('the auditor reads the decision log with before and after, verifies it, and changes nothing', async () => {
  const { page } = auditor;
  await page.goto(studyPath);
  await signIn(auditor, demoPeople.auditor.email, demoPassword);
  await page.getByRole('link', { name: 'Decision log' }).click();
  await page.getByText(/signed Length for one transfer unit/).waitFor();
  await page.getByLabel('Text in it').fill('6.5e-10');
  await page
    .getByText(/Changed the diffusion coefficient at Cooler tube/i)
    .first()
    .waitFor();
  const entry = page.getByRole('listitem').filter({ hasText: 'diffusion coefficient at Cooler tube' }).last();
  await entry.getByText('Before and after').click();
  await entry
    .getByRole('cell', { name: /6\.5e-10/ })
    .first()
    .waitFor();
  await expectAccessible(page);

  await page.getByRole('button', { name: 'Verify the log' }).click();
  await page.getByText(/^Whole: \d+ entries/).waitFor();

  await page.goto(studyPath);
  await page
    .getByText(/Only a scale-up engineer of this study may change the chain; you are an auditor/)
    .first()
    .waitFor();
  expect(await page.getByRole('button', { name: 'Submit for review' }).count()).toBe(0);
});

it('shows every page without a fault in the dark and at 390 px, and nobody\u2019s console complained', async () => {
  for (const theme of ['light', 'dark'] as const) {
    const visitor = await visit(browser, product.address, { width: 390, height: 844, theme });
    const { page } = visitor;
    await page.goto('/');
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await expectAccessible(page);
    await signIn(visitor, demoPeople.engineer.email, demoPassword);
    for (const [path, heading] of [
      ['/', 'Work list'],
      ['/studies', 'Studies'],
      [`${studyPath}/log`, 'Decision log'],
      [submissionPath, 'Review of Length for one transfer unit'],
      [studyPath, 'Cooler tube, wall transfer'],
    ] as const) {
      await page.goto(path);
      await page.getByRole('heading', { name: heading }).first().waitFor();
      await page.getByText(/^Loading/).waitFor({ state: 'detached' });
      await expectAccessible(page);
      expect(await sidewaysScroll(page), path).toBeLessThanOrEqual(0);
    }
    expect(visitor.complaints).toEqual([]);
    await visitor.leave();
  }
  expect([...engineer.complaints, ...manager.complaints, ...auditor.complaints]).toEqual([]);
});

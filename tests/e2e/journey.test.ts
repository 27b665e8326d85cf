import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, expect, it } from 'vitest';
import { demoPassword, demoPeople } from '../../server/scripts/demo/people.ts';
import { accessibilityFaults, launchBrowser, signIn, type Visitor, visit } from '../support/browser.ts';
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
  await page.getByRole('group', { name: /Wall mass-transfer coefficient/ }).first().waitFor();
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
  await inspector(page).getByRole('row', { name: /Pr.*4\.84/ }).waitFor();
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
  await page.getByText(/Type A/).first().waitFor();
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Add the test to the study' }).click();

  await page.getByRole('heading', { name: 'Run 7 is in the study' }).waitFor();
  await page.getByRole('button', { name: 'Use as h' }).click();
  await page.getByRole('heading', { name: 'Run 7' }).first().waitFor();
  // Gnielinski gives 4800 W/(m² K) for water at Re 25 000 in this tube, within its 10 %.
  await page.getByText(/4\.8\d.*±/).first().waitFor();
});

it('links h over a heat analogue to k at the plant, adds a correlation and adopts', async () => {
  const { page } = engineer;
  await page.getByRole('group', { name: /Wall mass-transfer coefficient/ }).first().click();
  await page.getByRole('button', { name: '+ Heat analogue' }).click();
  await page.getByLabel('Measured heat-transfer coefficient').selectOption({ index: 1 });
  await page.getByText(/Re is .* at/).first().waitFor();
  await expectAccessible(page);
  await saved(page);
  await page.screenshot({ path: '/tmp/e2e-a.png', fullPage: true });
});

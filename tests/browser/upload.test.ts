import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Night } from '@/db/models/night';
import { database } from '@/db/connection';
import { fixturePath } from '@/db/seeders/fixture-files';
import { launchBrowser } from '../support/browser';
import { signedIn } from '../support/signed-in';

let browser: Browser;
let page: Page;
let address: string;
const file = (name: string): string => fixturePath(`uploads/${name}`);

beforeAll(async () => {
  database();
  const night = await Night.findOne({ where: { date: '2026-11-08' }, rejectOnEmpty: true });
  address = `/nights/${night.publicId}/measurements`;
  browser = await launchBrowser();
  page = await signedIn(browser, 'observer');
});
afterAll(() => browser.close());

const panel = () => page.getByRole('form', { name: 'Upload a measurement table' });
const upload = () => panel().getByRole('button', { name: 'Upload', exact: true });
const rowOf = (name: string) =>
  page.getByRole('row').filter({ has: page.getByRole('link', { name, exact: true }) });

describe('uploading a table on the page of its night', () => {
  it('asks for a file before anything else', async () => {
    await page.goto(address);
    await upload().click();
    await expect.poll(() => panel().getByRole('alert').first().textContent()).toBe('Choose a file first.');
  });

  it('a faulty table is refused, with every fault on the set’s page and as a download', async () => {
    await page.goto(address);
    await page.getByLabel('File of the table').setInputFiles(file('2026-11-03-standards-faulty.csv'));
    await panel().getByLabel('Name').first().fill('Spoilt');
    // Pressed twice in a hurry it is one upload.
    await upload().dblclick();
    await rowOf('Spoilt').getByText('refused').waitFor({ timeout: 20_000 });
    expect(await rowOf('Spoilt').count()).toBe(1);
    await rowOf('Spoilt').getByRole('link').click();
    await page.getByRole('heading', { level: 1, name: 'Spoilt' }).waitFor();
    const table = page.getByRole('table', { name: 'Faults of the table' });
    await table.waitFor();
    const first = table.getByRole('row').filter({ hasText: '14.2.31' });
    expect(await first.getByRole('cell').allTextContents()).toEqual([
      '5',
      'inst_mag',
      '14.2.31',
      'This is not a number.',
      expect.stringContaining('decimal number'),
    ]);
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Download as CSV' }).click(),
    ]);
    expect(download.suggestedFilename()).toBe('2026-11-03-standards-faulty-faults.csv');
  });

  it('a good table is taken, and its page says what is in it', async () => {
    await page.goto(address);
    await page.getByLabel('File of the table').setInputFiles(file('2026-11-08-targets.csv'));
    await panel().getByLabel('Its rows are').selectOption('target');
    await panel().getByLabel('Name').first().fill('Targets');
    await upload().click();
    await rowOf('Targets').getByText('matched').waitFor({ timeout: 20_000 });
    await rowOf('Targets').getByRole('link').click();
    await page.getByText(/4,567 rows of/).waitFor();
    await page.getByRole('link', { name: /^Rows/ }).click();
    await page.getByRole('table', { name: 'Rows of the set' }).waitFor();
    await page.getByRole('link', { name: 'Further rows' }).click();
    const rows = page.getByRole('table', { name: 'Rows of the set' });
    await expect.poll(() => rows.getByRole('row').nth(1).getByRole('cell').first().textContent()).toBe('101');
  });

  it('the same file again is named as the set that has it, and the form keeps what was typed', async () => {
    await page.goto(address);
    await page.getByLabel('File of the table').setInputFiles(file('2026-11-08-targets.csv'));
    await panel().getByLabel('Name').first().fill('Once more');
    await upload().click();
    await page.getByText('This file was uploaded to this night before').waitFor();
    expect(await panel().getByLabel('Name').first().inputValue()).toBe('Once more');
    await page.getByRole('link', { name: 'Open the set that has these bytes' }).click();
    await page.getByRole('heading', { level: 1, name: 'Targets' }).waitFor();
  });

  it('a table with other headers asks which column is which, and remembers the answer', async () => {
    await page.goto(address);
    const other = {
      name: 'other.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from('Picture,Source,Brightness (mag),Scatter\n21,X1,15.5,0.01\n'),
    };
    await page.getByLabel('File of the table').setInputFiles(other);
    await page.getByText('There is no column with the instrumental magnitude').waitFor();
    await upload().click();
    expect(await rowOf('other.csv').count()).toBe(0);
    await page.getByLabel('inst_mag in the file').selectOption('Brightness (mag)');
    await page.getByLabel('inst_err in the file').selectOption('Scatter');
    await page.getByText('Every column that is needed has been found.').waitFor();
    await upload().click();
    await rowOf('other.csv').getByText('matched').waitFor({ timeout: 20_000 });
    await page.reload();
    await page
      .getByLabel('File of the table')
      .setInputFiles({ ...other, buffer: Buffer.from(`${other.buffer.toString()}21,X2,15.5,0.01\n`) });
    await expect
      .poll(() => panel().textContent())
      .toContain('read as Noor Hathaway said of tables like this');
  });
});

import type { Page } from 'playwright-core';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import type { Light } from '@/lib/contracts/light';
import type { DemoAccount } from '@/tests/support/sign-in';

/** One picture of the README's tour: who looks at what, in which light. */
export interface Picture {
  /** File below public/tour, without its ending. */
  readonly name: string;
  readonly account: DemoAccount;
  readonly light: Light;
  /** Goes where the picture is taken, and waits until all of it is there. */
  readonly open: (page: Page) => Promise<void>;
}

/** The page of a night of the demo, by way of the list of nights. */
async function openNight(page: Page, date: string): Promise<void> {
  await page.goto('/nights');
  await page.getByRole('link', { name: formatDateInWords(date) }).click();
  await page.getByRole('table', { name: 'Frames, the latest first' }).waitFor();
}

export const pictures: readonly Picture[] = [
  {
    name: 'log-dark-site',
    account: 'observer',
    light: 'dark-site',
    open: async (page) => {
      await page.goto('/');
      await page.getByRole('link', { name: 'Continue the log' }).click();
      await page.getByRole('form', { name: 'Log a frame' }).waitFor();
    },
  },
  {
    name: 'night',
    account: 'photometrist',
    light: 'day',
    open: (page) => openNight(page, '2026-11-08'),
  },
  {
    name: 'measurements',
    account: 'photometrist',
    light: 'day',
    open: async (page) => {
      await openNight(page, '2026-11-03');
      await page.goto(`${new URL(page.url()).pathname}/measurements`);
      await page.getByRole('main').getByRole('link', { name: 'Standards', exact: true }).click();
      await page.getByRole('table', { name: 'Stars that are' }).waitFor();
    },
  },
  {
    name: 'solution',
    account: 'photometrist2',
    light: 'day',
    open: async (page) => {
      await openNight(page, '2026-11-03');
      await page.goto(`${new URL(page.url()).pathname}/solutions`);
      await page
        .getByRole('main')
        .getByRole('link', { name: /^(Solution )?2$/ })
        .first()
        .click();
      await page.getByRole('heading', { level: 1, name: /^Solution 2/ }).waitFor();
      await page.locator('main svg circle').first().waitFor();
    },
  },
  {
    name: 'results',
    account: 'pi',
    light: 'day',
    open: async (page) => {
      await openNight(page, '2026-10-17');
      await page.goto(`${new URL(page.url()).pathname}/results`);
      await page.getByRole('img', { name: /^Colour–magnitude diagram/ }).waitFor();
      // The end of the table, the diagram, and what the magnitudes rest on.
      await page.getByRole('heading', { name: 'Colour–magnitude diagram' }).evaluate((heading) => {
        heading.closest('section')?.scrollIntoView({ block: 'end' });
      });
    },
  },
  {
    name: 'standards',
    account: 'photometrist',
    light: 'day',
    open: async (page) => {
      await page.goto('/standards/sa98');
      await page.getByRole('table', { name: 'Standard stars of the field' }).waitFor();
    },
  },
];

/** Files that can't be read are refused at the form, with the place and the mend, and leave nothing behind. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { words } from '../../web/words/en.ts';
import { expectNoAxeViolations, type TestPage } from '../support/browser.ts';
import { enter, goTo, heading, type Running, STUDIES, startDemo } from './steps.ts';

const { imports } = words;

const BAD_FILES: readonly { what: string; bytes: Buffer; says: string }[] = [
  {
    what: 'an empty file',
    bytes: Buffer.alloc(0),
    says: 'The file is empty. Export it again with a header line and at least one row.',
  },
  {
    what: 'a header alone',
    bytes: Buffer.from('Subject,Days,Reaction\n'),
    says: 'The file holds a header line and no row below it. Export it again with its rows.',
  },
  {
    what: 'letters in latin-1',
    bytes: Buffer.from('Subject,Days,Reaction\nA1,0,250\nMüller,1,260\n', 'latin1'),
    says: 'Line 3, column 2 holds a letter that is not UTF-8. Save the file as CSV (UTF-8).',
  },
  {
    what: 'a quote that never closes',
    bytes: Buffer.from('Subject,Days,Reaction\nA1,0,250\nA1,1,"260\nA1,2,270\n'),
    says: 'A quote opened in line 3, column 6 never closes. Close it, or remove it.',
  },
  {
    what: 'a NUL byte',
    bytes: Buffer.from('Subject,Days,Reaction\nA1,0,25\0\n'),
    says: 'Line 2, column 8 holds a NUL byte: this is not a text file.',
  },
  {
    what: 'bars between the columns',
    bytes: Buffer.from('Subject|Days|Reaction\nA1|0|250\n'),
    says: 'Line 1 holds a single column. Separate columns by comma, semicolon or tab.',
  },
];

describe('a file that can’t be read', () => {
  let running: Running;
  let visitor: TestPage;
  beforeAll(async () => {
    running = await startDemo();
    visitor = await enter(running, 'coordinator', STUDIES.empty);
    await goTo(visitor.page, 'import');
  });
  afterAll(() => running?.close());

  it('is asked for where none is chosen', async () => {
    const { page } = visitor;
    await page.getByRole('button', { name: imports.upload }).click();
    const alert = page.getByRole('alert');
    await alert.getByText(imports.fileMissing).waitFor();
    expect(await alert.evaluate((element) => element === document.activeElement)).toBe(true);
    await expectNoAxeViolations(page);
    visitor.expectNoComplaints();
  });

  it.each(BAD_FILES)('is refused at the form: $what', async ({ bytes, says }) => {
    const { page } = visitor;
    await page
      .getByLabel(imports.file, { exact: true })
      .setInputFiles({ name: 'from-the-lab.csv', mimeType: 'text/csv', buffer: bytes });
    await page.getByRole('button', { name: imports.upload }).click();
    await page.getByRole('alert').getByText(says).waitFor();

    // The form is as it was: still here, the measure and the file still chosen.
    expect(await heading(page, imports.heading).isVisible()).toBe(true);
    await page.getByRole('button', { name: imports.measure }).getByText('Reaction time').waitFor();
    expect(
      await page
        .getByLabel(imports.file, { exact: true })
        .evaluate((input: HTMLInputElement) => input.files?.[0]?.name),
    ).toBe('from-the-lab.csv');
    visitor.expectNoComplaints(['400', '422', '413']);
  });

  it('leaves nothing behind', async () => {
    const { page } = visitor;
    await page.reload();
    await page.getByText(imports.empty).waitFor();
    const [kept] = await running.app.database.query(
      `SELECT (SELECT count(*)::int FROM import i JOIN study s ON s.id = i.study_id WHERE s.short_name = 'reaction') AS imports,
              (SELECT count(*)::int FROM subject x JOIN study s ON s.id = x.study_id WHERE s.short_name = 'reaction') AS subjects`,
    );
    expect(kept).toEqual({ imports: 0, subjects: 0 });
    visitor.expectNoComplaints();
  });
});

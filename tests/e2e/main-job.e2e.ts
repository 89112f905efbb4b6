import { afterAll, beforeAll, expect, it } from 'vitest';
import { readReference } from '../reference/read-reference';
import { newVisitor, openServerDatabase, setClockOffset, waitForMail } from '../setup/browser';
import { expectAccessible } from './accessible';
import { firstAdministrator, invite, PASSWORD, signIn, type SignedIn } from './people';
import { writeDesign } from './write-design';
import { visit } from './visit';

/*
 * A new trial through four cohorts, with every role doing its part in a real browser. The design is that of the case
 * rm-identity-basic of tests/reference/01_robbins_monro.json (Robbins & Monro 1951, computed in base R; responses
 * invented): start 50, target 0.3, cohorts of 3, a_k = 60/k, doses 0 to 200, here on a grid of whole mg.
 */
const TRIAL = 'RILL-01';
const HOUR = 3_600_000;
const people = {
  administrator: { name: 'Ada Fenn', email: 'ada.fenn@example.org' },
  statistician: { name: 'Stan Moor', email: 'stan.moor@example.org' },
  first: { name: 'Dr Rhea Tarn', email: 'rhea.tarn@example.org' },
  second: { name: 'Dr Ivo Beck', email: 'ivo.beck@example.org' },
  north: { name: 'Cora North', email: 'cora.north@example.org' },
  south: { name: 'Cyril South', email: 'cyril.south@example.org' },
  sponsor: { name: 'Sal Weir', email: 'sal.weir@example.org' },
} as const;

const reference = readReference<
  { responses: number[]; cohort_size: number; Gamma: number; c: number },
  { x: number[] }
>('01_robbins_monro.json').find((each) => each.id === 'rm-identity-basic');
if (!reference) throw new Error('The reference case is gone.');
const { inputs, outputs } = reference;

/** The recursion by hand: x − (60/k)(y/3 − 0.3), cohort by cohort. */
const byHand = (() => {
  const values = [50];
  for (const [index, responses] of inputs.responses.slice(0, 4).entries()) {
    const last = values.at(-1) ?? 50;
    values.push(last - (60 / (index + 1)) * (responses / 3 - 0.3));
  }
  return values;
})();

let administrator: SignedIn;
let offset = 0;

/** Lets an hour and a half pass: the observation window of one hour ends. */
async function letWindowsEnd(): Promise<void> {
  offset += 1.5 * HOUR;
  await setClockOffset(offset);
}

beforeAll(async () => {
  openServerDatabase();
  administrator = await firstAdministrator(people.administrator);
});

afterAll(async () => {
  await setClockOffset(0);
});

it('the case is that of the reference file', () => {
  expect(inputs).toMatchObject({ cohort_size: 3, Gamma: 0.3, c: 60 });
  byHand.forEach((value, index) => expect(value).toBeCloseTo(outputs.x[index] ?? NaN, 10));
});

it('the administrator creates people, sites, the trial and its team; a grant that breaks the separation is refused', async () => {
  for (const role of ['statistician', 'first', 'second', 'north', 'south', 'sponsor'] as const) {
    await invite(administrator, people[role]);
  }
  const { page } = administrator;
  for (const [code, name] of [
    ['NTH', 'Northwater Clinic'],
    ['STH', 'Southwater Clinic'],
  ] as const) {
    await visit(page, '/administration/sites');
    const form = page.getByRole('form', { name: 'Create a site' });
    await form.getByLabel('Code').fill(code);
    await form.getByLabel('Name', { exact: true }).fill(name);
    await form.getByLabel('Time zone').selectOption('Europe/Vienna');
    await form.getByRole('button', { name: 'Create site' }).click();
    await page.getByText('Created.').waitFor();
  }
  await visit(page, '/administration/trials');
  const creation = page.getByRole('form', { name: 'Create a trial' });
  await creation.getByLabel('Code').fill(TRIAL);
  await creation.getByLabel('Title').fill('Intranasal GV-77 in seasonal rhinitis');
  await creation.getByLabel('First statistician').selectOption({ label: optionOf(people.statistician) });
  await creation.getByRole('button', { name: 'Create trial' }).click();
  await page.waitForURL(`**/administration/trials/${TRIAL}`);
  for (const site of ['Northwater Clinic', 'Southwater Clinic']) {
    const form = page.getByRole('form', { name: 'Add a site' });
    const select = form.getByRole('combobox');
    const option = await select.locator('option', { hasText: site }).textContent();
    await select.selectOption({ label: option ?? site });
    await form.getByRole('button', { name: 'Add site' }).click();
    await page
      .getByRole('cell', { name: site })
      .or(page.getByRole('rowheader', { name: site }))
      .first()
      .waitFor();
  }
  const grant = async (person: { name: string; email: string }, role: string, site?: string) => {
    await visit(page, `/administration/trials/${TRIAL}`);
    const form = page.getByRole('form', { name: 'Grant a role' });
    await form.getByLabel('Person').selectOption({ label: optionOf(person) });
    await form.getByRole('radio', { name: new RegExp(`^${role}`) }).check();
    if (site) await form.getByLabel(site).check();
    await form.getByRole('button', { name: 'Grant role' }).click();
  };
  const granted = () => page.getByText('Granted. It holds from now on.').waitFor();
  await grant(people.first, 'Safety reviewer');
  await granted();
  await grant(people.second, 'Safety reviewer');
  await granted();
  await grant(people.north, 'Site coordinator', 'Northwater Clinic');
  await granted();
  await grant(people.south, 'Site coordinator', 'Southwater Clinic');
  await granted();
  await grant(people.sponsor, 'Sponsor');
  await granted();
  await visit(page, `/administration/trials/${TRIAL}`);
  await expectAccessible(page);
  // A person has one role in a trial: the select still offers nobody who has one, so the refusal is the action's.
  expect(administrator.complaints).toEqual([]);
});

/** How the selects of the administration name a person. */
function optionOf({ name, email }: { name: string; email: string }): string {
  return `${name} (${email})`;
}

it('the statistician writes and submits the design; a reviewer approves it', async () => {
  const statistician = await signIn(people.statistician);
  await visit(statistician.page, `/trials/${TRIAL}/design/edit`);
  await writeDesign(statistician.page);
  await visit(statistician.page, `/trials/${TRIAL}/design`);
  await expectAccessible(statistician.page);
  await statistician.page.getByRole('button', { name: 'Submit for approval' }).click();
  await statistician.page.getByText('In review').first().waitFor();
  expect(statistician.complaints).toEqual([]);
  await statistician.context.close();

  await waitForMail(people.first.email, /design/i);
  const reviewer = await signIn(people.first);
  const { page } = reviewer;
  await visit(page, `/trials/${TRIAL}/design`);
  await expectAccessible(page);
  await page.getByLabel('Your e-mail address').fill(people.first.email);
  await page.getByLabel('Your password', { exact: true }).fill(PASSWORD);
  await page.getByRole('button', { name: /Sign and approve/ }).click();
  await page
    .getByText(/approved/i)
    .first()
    .waitFor();
  expect(reviewer.complaints).toEqual([]);
  await reviewer.context.close();
});

async function signRelease(reviewer: SignedIn, dose: number, button: RegExp): Promise<void> {
  const { page } = reviewer;
  await visit(page, `/trials/${TRIAL}/review`);
  await page.getByRole('button', { name: button }).waitFor();
  expect(await page.getByRole('heading', { level: 1 }).textContent()).toContain(`${dose} mg`);
  await page.getByLabel('Your e-mail address').fill(reviewer.email);
  await page.getByLabel('Your password', { exact: true }).fill(PASSWORD);
  await page.getByRole('button', { name: button }).click();
}

/** Both reviewers sign the dose that waits; the first signature releases nothing. */
async function release(first: SignedIn, second: SignedIn, cohort: number, dose: number): Promise<void> {
  await waitForMail(
    first.email,
    cohort === 1 ? /starting dose|signature/i : new RegExp(`cohort ${cohort - 1}`, 'i'),
  );
  await signRelease(first, dose, new RegExp(`Sign for ${dose} mg \\(1 of 2\\)`));
  await first.page.getByText('You have signed').waitFor();
  await signRelease(second, dose, new RegExp(`Sign and release ${dose} mg`));
  await second.page.getByText(`${dose} mg released for cohort ${cohort}`).waitFor();
  const letter = await waitForMail(people.north.email, new RegExp(`dose released for cohort ${cohort}`));
  expect(letter.text).toContain(`${dose} mg`);
}

/** Reserves a place and records its dosing, now. */
async function dose(coordinator: SignedIn, cohort: number, code: string): Promise<void> {
  const { page } = coordinator;
  await visit(page, `/trials/${TRIAL}/cohorts/${cohort}`);
  await page.getByLabel('Subject code').fill(code);
  await page.getByRole('button', { name: 'Reserve a place' }).dblclick();
  const form = page.getByRole('form', { name: `Record the dosing of ${code}` });
  await form.getByRole('button', { name: /^Now/ }).click();
  await form.getByRole('button', { name: 'Record dosing' }).click();
  await page.getByText(`The dosing of ${code} is on record`).waitFor();
}

async function recordOutcome(
  coordinator: SignedIn,
  cohort: number,
  code: string,
  present: boolean,
): Promise<void> {
  const { page } = coordinator;
  await visit(page, `/trials/${TRIAL}/cohorts/${cohort}`);
  const form = page.getByRole('form', { name: `Record the outcome of ${code}` });
  if (!(await form.isVisible())) {
    await page
      .getByRole('listitem')
      .filter({ hasText: code })
      .getByText('Record an outcome', { exact: true })
      .click();
  }
  await form.getByRole('radio', { name: present ? /^drowsiness/ : /^no drowsiness/ }).check();
  if (present) await form.getByRole('button', { name: /^Now/ }).click();
  await form.getByRole('button', { name: 'Record outcome' }).click();
  await form.waitFor({ state: 'detached' });
}

it('four cohorts: each recommended dose is that of the recursion, signed by two and released to the sites', async () => {
  const first = await signIn(people.first);
  const second = await signIn(people.second, { width: 390, colorScheme: 'dark' });
  const north = await signIn(people.north, { width: 390 });
  const south = await signIn(people.south);
  await release(first, second, 1, 50);
  let serial = 0;
  for (const [index, responses] of inputs.responses.slice(0, 4).entries()) {
    const cohort = index + 1;
    const subjects = [north, north, south].map((coordinator, place) => {
      serial += 1;
      const site = coordinator === north ? 'NTH' : 'STH';
      return { coordinator, code: `${site}-${String(serial).padStart(3, '0')}`, present: place < responses };
    });
    for (const { coordinator, code } of subjects) await dose(coordinator, cohort, code);
    for (const { coordinator, code, present } of subjects) {
      if (present) await recordOutcome(coordinator, cohort, code, true);
    }
    await letWindowsEnd();
    for (const { coordinator, code, present } of subjects) {
      if (!present) await recordOutcome(coordinator, cohort, code, false);
    }
    const expected = Math.round(byHand[cohort] ?? NaN);
    expect(expected).toBe(Math.round(outputs.x[cohort] ?? NaN));
    await visit(north.page, `/trials/${TRIAL}/cohorts/${cohort}`);
    await expectAccessible(north.page);
    await visit(first.page, `/trials/${TRIAL}/review`);
    await expectAccessible(first.page);
    await release(first, second, cohort + 1, expected);
  }
  for (const visitor of [first, second, north, south]) {
    expect(visitor.complaints).toEqual([]);
    await visitor.context.close();
  }
});

it('the sponsor sees signed doses and aggregates, and no subject anywhere', async () => {
  const sponsor = await signIn(people.sponsor);
  const { page } = sponsor;
  await visit(page, `/trials/${TRIAL}`);
  await page.waitForURL(`**/trials/${TRIAL}/summary`);
  await page.getByText('Signed doses', { exact: true }).waitFor();
  await expectAccessible(page);
  const html = await page.content();
  expect(html).not.toMatch(/NTH-0|STH-0/);
  expect(html).toContain('68 mg');
  for (const path of ['review', 'cohorts', 'cohorts/1', 'trail', 'design']) {
    await visit(page, `/trials/${TRIAL}/${path}`);
    await page.getByRole('heading', { name: 'Not found' }).waitFor();
    expect(await page.content(), path).not.toMatch(/NTH-0|STH-0/);
  }
  const api = await page.request.get(`/api/trials/${TRIAL}/cohorts/1`);
  expect(api.status()).toBe(404);
  expect(await api.json()).toMatchObject({ status: 404 });
  await waitForMail(people.sponsor.email, /cohort 5 is open/);
  await sponsor.context.close();
});

it('everyone but the administrator halts in two clicks; the quorum lifts; the trail holds all of it', async () => {
  const south = await signIn(people.south, { width: 390 });
  await visit(south.page, `/trials/${TRIAL}`);
  await south.page.getByText('Halt the trial', { exact: true }).click();
  await south.page.getByLabel('Reason').fill('A subject was found unconscious; the cause is not known.');
  await south.page.getByRole('button', { name: `Halt ${TRIAL} now` }).click();
  await south.page.getByText('The trial is halted').waitFor();
  await waitForMail(people.sponsor.email, /is halted/);
  await waitForMail(people.north.email, /is halted/);
  for (const person of [people.first, people.second]) {
    const reviewer = await signIn(person);
    const { page } = reviewer;
    await visit(page, `/trials/${TRIAL}/review`);
    await expectAccessible(page);
    await page.getByLabel('Reason').fill('The event was a faint at the sight of blood.');
    await page.getByLabel('Your e-mail address').fill(person.email);
    await page.getByLabel('Your password', { exact: true }).fill(PASSWORD);
    await page.getByRole('button', { name: /^Sign (to|and) lift the halt/ }).click();
    await page.getByText(person === people.first ? '1 stands now' : 'Nothing waits for signatures').waitFor();
    if (person === people.second) {
      await visit(page, `/trials/${TRIAL}/trail`);
      await page.getByText('The chain is whole.').waitFor();
      await expectAccessible(page);
      let text = await page.locator('main').innerText();
      const older = page.getByRole('link', { name: 'Older' });
      while (await older.isVisible()) {
        await visit(page, (await older.getAttribute('href')) ?? '');
        text += await page.locator('main').innerText();
      }
      for (const part of [
        `Trial ${TRIAL} created`,
        'Design approved',
        'Halt lifted',
        '71 mg released for cohort 5',
      ]) {
        expect(text).toContain(part);
      }
    }
    expect(reviewer.complaints).toEqual([]);
    await reviewer.context.close();
  }
  await south.context.close();
});

it('an administrator sees no trial page, a stranger nothing at all', async () => {
  const answer = await visit(administrator.page, `/trials/${TRIAL}`);
  expect(answer?.status()).toBe(404);
  const stranger = await newVisitor();
  await visit(stranger.page, `/trials/${TRIAL}/review`);
  await stranger.page.waitForURL(/sign-in/);
  const api = await stranger.page.request.get(`/api/trials/${TRIAL}/cohorts/1`);
  expect(api.status()).toBe(401);
  await stranger.context.close();
});

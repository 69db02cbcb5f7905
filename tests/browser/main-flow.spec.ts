import { readFileSync } from 'node:fs';
import { expect, test } from '@playwright/test';
import { Person } from './people';

/**
 * The main job as its three people do it. Plant and gains are those of a loop whose figures were computed outside the
 * project; see tests/reference/SOURCES.md.
 */
interface ReferenceLoop {
  id: string;
  plant: { num: number[]; den: number[]; delay: number };
  controller: { Kp: number; Ti: number; Td: number };
  expect: {
    GM: number;
    PM_deg: number;
    Ms: number;
    setpoint: { overshoot_pct: number; settling_time_2pct: number };
  };
}

const loops = JSON.parse(readFileSync('tests/reference/loops-open.json', 'utf8')) as {
  cases: ReferenceLoop[];
};
const found = loops.cases.find(({ id }) => id === 'o-fopdt-03');
if (!found) throw new Error('the reference loop o-fopdt-03 is missing');
const loop = found;
const { plant, controller, expect: figures } = loop;

const MOST_INTERACTIONS = 15;

/** "6.28 %" -> 6.28; a figure as the page shows it. */
async function shown(text: Promise<string | null>): Promise<number> {
  const match = /[−-]?\d+(\.\d+)?/.exec((await text) ?? '');
  return Number((match?.[0] ?? 'NaN').replace('−', '-'));
}

function near(value: number, reference: number): void {
  // Pages show four significant digits.
  expect(Math.abs(value - reference)).toBeLessThanOrEqual(5.1e-4 * Math.abs(reference));
}

test('from a pasted plant to a change that is applied, by three people', async ({ browser }) => {
  const engineer = await Person.at(browser);
  const { page } = engineer;
  await engineer.signIn('engineer');
  await engineer.follow('SC-05');
  await expect(page.getByRole('heading', { level: 1, name: 'Belt speed' })).toBeVisible();

  await test.step('the plant is set back with its poles, gain and dead time', async () => {
    const text = `${plant.num[0]} e^(-${plant.delay}s)/(${plant.den[0]}s+1)`;
    await engineer.type('Plant, as you have it', text);
    await expect(page.getByRole('img', { name: `The plant as read: ${text}` })).toContainText('30s + 1');
    await expect(page.getByText('−0.03333 rad/s')).toBeVisible();
    await expect(page.locator('dd').filter({ hasText: '6 s' }).first()).toBeVisible();
  });

  await test.step('the requirement is stated', async () => {
    await engineer.type('Overshoot', '10');
    await engineer.type('Settling time', '90');
    await engineer.type('Gain margin', '1,5');
    await engineer.type('Phase margin', '40');
    await engineer.type('Sensitivity peak', '2');
  });

  await test.step('a rule, a type and the dial give gains that follow at once', async () => {
    await engineer.choose('Rule', 'SIMC');
    await engineer.pick('PI');
    // Skogestad 2003: tau_c = theta at the middle of the dial, Kc = tau/(k(tau_c + theta)) = 30/(0.5·12) = 5.
    await expect(page.locator('[data-gain=p]')).toContainText('5.000');
    await expect(page.locator('[data-gain=i]')).toContainText('30.000');
    const dial = page.getByLabel('Aggressiveness');
    await dial.fill('0.3');
    engineer.interactions += 1;
    await expect(page.locator('[data-gain=p]')).not.toContainText('5.000');
  });

  await test.step('typed gains give the reference figures', async () => {
    await engineer.choose('Rule', 'Gains typed by hand');
    await engineer.type('Gain Kp', String(controller.Kp));
    await engineer.type('Integral time Ti', String(controller.Ti));
    await engineer.type('Derivative time Td', '');
    await expect(page.locator('[data-margin=ms] dd')).toHaveText(String(Number(figures.Ms.toPrecision(4))));
    near(await shown(page.locator('[data-margin=gain-margin] dd').textContent()), figures.GM);
    near(await shown(page.locator('[data-margin=phase-margin] dd').textContent()), figures.PM_deg);
    near(await shown(page.locator('[data-margin=ms] dd').textContent()), figures.Ms);
    const strip = page.locator('[data-requirement=overshootMax]');
    await expect(strip).toContainText(`${Number(figures.setpoint.overshoot_pct.toPrecision(3))} %`);
    await expect(strip).toContainText('room');
    await expect(page.getByText('Requirement met').first()).toBeVisible();
  });

  await test.step('the gains are kept', async () => {
    await engineer.press('Keep as v2');
    await engineer.type('Reason', 'Slower belt after the new gearbox.');
    await engineer.press('Keep this version');
    await expect(page.getByText('Kept as v2')).toBeVisible();
  });

  await test.step('and handed over', async () => {
    await engineer.press('Hand over …');
    const dialog = page.getByRole('dialog');
    await expect(dialog.locator('[data-row=p]')).toContainText('4.400');
    await engineer.type('Reason', 'The belt overruns its stop since the gearbox was changed.');
    await engineer.type('Risk', 'Trays may bunch up once.');
    await engineer.type('Test to run', 'Step the set-point by 5 m/min, stop above 10 % overshoot.');
    await engineer.pick('no');
    await engineer.press('Submit for signature');
    await expect(page.getByRole('heading', { level: 1, name: /C-\d{4}: v1 → v2/ })).toBeVisible();
    await expect(page.getByText('Nothing for you to do')).toHaveCount(0);
  });
  const record = page.url();
  console.log(`interactions of the engineer from sign-in to handed over: ${engineer.interactions}`);
  expect(engineer.interactions).toBeLessThanOrEqual(MOST_INTERACTIONS);

  const approver = await Person.at(browser);
  await test.step('another person signs with the password, and issues', async () => {
    await approver.signIn('approver');
    await expect(
      approver.page.getByText('Slower belt').or(approver.page.getByText('The belt overruns')).first(),
    ).toBeVisible();
    await approver.page.goto(record);
    await approver.type('Your password, to sign', 'not the password');
    await approver.press('Sign and approve');
    await expect(approver.page.getByText('Nothing was signed', { exact: false }).first()).toBeVisible();
    await approver.type('Your password, to sign', 'brackwater-demo');
    await approver.press('Sign and approve');
    await approver.press('Issue to the machine');
    await expect(approver.page.locator('[data-event=issue]')).toBeVisible();
  });

  const technician = await Person.at(browser, { width: 360, height: 740 });
  await test.step('the technician enters as-found and as-left on a phone', async () => {
    const phone = technician.page;
    await technician.signIn('technician');
    await phone.goto(record.replace('/changes/', '/sheet/'));
    await expect(phone.getByText('4.400')).toHaveCount(0);
    await technician.type('Device label, as it stands on the device', 'IC1-VFD1');
    const cautions = phone.getByRole('checkbox');
    for (let i = 0; i < (await cautions.count()); i += 1) await cautions.nth(i).check();
    await technician.press('Next: as found');
    const values = phone.locator('[data-value]');
    for (let i = 0; i < (await values.count()); i += 1) {
      const expected = (await values.nth(i).locator('.font-mono').first().textContent()) ?? '';
      await values.nth(i).getByRole('textbox').fill(expected.trim().replace('−', '-'));
    }
    await technician.press('Uncover the new values');
    await expect(phone.getByText('4.400')).toBeVisible();
    await phone.locator('[data-value=p]').getByRole('textbox').fill('4,4');
    await phone.locator('[data-value=i]').getByRole('textbox').fill('0.45');
    await expect(phone.locator('[data-value=i]')).toContainText('not what is expected');
    await phone.locator('[data-value=i]').getByRole('textbox').fill('27');
    await phone.locator('[data-value=d]').getByRole('textbox').fill('0');
    await technician.press('Next: save and close');
    await phone.getByLabel('Yes, saved and read again').check();
    await technician.press('Mark as applied');
    await expect(phone.locator('[data-event=apply]')).toBeVisible();
    await expect(phone.locator('[data-report=apply]')).toContainText('IC1-VFD1');
  });

  await test.step('the version in service has moved, and the admin finds the letters', async () => {
    await page.goto(record);
    await expect(page.locator('[data-event]')).toHaveCount(5);
    await page.getByRole('link', { name: /SC-05/ }).first().click();
    await expect(page.getByText(/In service: v2/)).toBeVisible();
    const admin = await Person.at(browser);
    await admin.signIn('admin');
    await expect(async () => {
      await admin.page.goto('/inbox');
      await expect(
        admin.page.locator('[data-letter]').filter({ hasText: 'SC-05 has been applied' }).first(),
      ).toBeVisible({ timeout: 1000 });
    }).toPass({ timeout: 20_000 });
    await expect(
      admin.page.locator('[data-letter]').filter({ hasText: 'SC-05 waits for your signature' }).first(),
    ).toBeVisible();
  });
});

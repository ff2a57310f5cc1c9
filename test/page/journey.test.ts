import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { armload, type OpenPage, openPage } from './browserPage.ts';

const MODEL = 'models/six-joint.arm.json';
const FILE = JSON.parse(readFileSync(MODEL, 'utf8')) as {
  name: string;
  joints: { name: string; travel_deg: [number, number] }[];
  cases: { name: string }[];
};

interface PoseJson {
  results: { case: string; joints: { joint: string; bearings: Record<string, { radial_N: number }> }[] }[];
}
interface SweepJson {
  poses: number;
  joints: {
    joint: string;
    checks: { bearing: string; check: string; value: number; pose_deg: number[]; case: string }[];
  }[];
}

/** The machine of a test may have more to do. */
const PATIENT = { timeout: 30_000 };

let open: OpenPage;
let page: Page;

beforeAll(async () => {
  open = await openPage();
  page = open.page;
});

afterAll(() => open?.close());

const status = () => page.getByRole('status');
const swept = () =>
  status()
    .filter({ hasText: /poses, [\d.]+ s/ })
    .waitFor({ timeout: 150_000 });
const nowOf = (joint: string, what: string): Locator => page.locator(`[data-check="${joint}/${what}"]`);

async function numberIn(cell: Locator): Promise<number> {
  return Number(await cell.getAttribute('data-now'));
}

async function setAngle(joint: string, degrees: number): Promise<void> {
  const field = page.getByRole('spinbutton', { name: `Angle of ${joint}` });
  await field.fill(String(degrees));
  await field.press('Enter');
}

async function openModel(name: string): Promise<void> {
  await page.getByRole('button', { name: 'Models…' }).click();
  await page
    .getByRole('dialog')
    .getByRole('button', { name: new RegExp(`^${name}`) })
    .click();
  await page
    .getByRole('textbox', { name: 'Title' })
    .and(page.locator(`[value="${name}"]`))
    .waitFor();
}

async function dropFile(name: string, text: string): Promise<void> {
  const data = await page.evaluateHandle(
    ([fileName, content]) => {
      const transfer = new DataTransfer();
      transfer.items.add(new File([content!], fileName!, { type: 'application/json' }));
      return transfer;
    },
    [name, text],
  );
  await page.locator('.sheet').dispatchEvent('drop', { dataTransfer: data });
}

describe('a journey over the sheet', () => {
  test('it opens on the picking arm, already swept, with no error', async () => {
    await swept();
    await expect(page.getByRole('textbox', { name: 'Title' }).inputValue()).resolves.toBe('Glasshouse picking arm');
    const lines = page.getByRole('button', { name: /^[AB] [\d\s.]+ N : Worst radial load of/ });
    expect(await lines.count()).toBe(10);
    await page.locator('.stage-canvas canvas').waitFor();
    expect(open.errors).toEqual([]);
  });

  test('another model opens, and the loads at a typed pose are those of the command line', async () => {
    await openModel(FILE.name);
    await swept();
    const pose = FILE.joints.map(({ travel_deg: [from, to] }, i) => Math.round(from + (to - from) * (0.3 + 0.07 * i)));
    for (const [i, { name }] of FILE.joints.entries()) await setAngle(name, pose[i]!);
    await page.getByRole('tab', { name: 'Worst loads' }).click();
    for (const { name: load } of FILE.cases) {
      await page.getByRole('combobox', { name: 'Case on stage' }).selectOption(load);
      const json = armload('pose', MODEL, `--at=${pose.join(',')}`, '--case', load) as PoseJson;
      for (const { joint, bearings } of json.results[0]!.joints) {
        for (const [bearing, { radial_N }] of Object.entries(bearings)) {
          const cell = nowOf(joint, `${bearing} radial`);
          await expect.poll(() => numberIn(cell), PATIENT).toBeCloseTo(radial_N, 6);
          const shown = ((await cell.textContent()) ?? '').replace(/[\u2009\s]/g, '').replace('N', '');
          expect(Math.abs(Number(shown) - radial_N)).toBeLessThanOrEqual(
            0.5 * 10 ** (Math.floor(Math.log10(radial_N)) - 3) + 1e-9,
          );
        }
      }
    }
  });

  test('a long sweep shows its progress and stops, and says that it is partial', async () => {
    await page.getByRole('spinbutton', { name: 'Step of the grid' }).fill('5');
    await page.getByRole('spinbutton', { name: 'Step of the grid' }).press('Enter');
    await page.getByRole('button', { name: 'Sweep', exact: true }).click();
    await status()
      .filter({ hasText: / of .* poses/ })
      .waitFor();
    await page.getByRole('button', { name: 'Stop', exact: true }).click();
    await status().filter({ hasText: 'stopped, partial' }).waitFor(PATIENT);
  });

  test('no worst load is below the grid of the command line, and its pose is a click away', async () => {
    const step = page.getByRole('spinbutton', { name: 'Step of the grid' });
    await step.fill('120');
    await step.press('Enter');
    await page.getByRole('button', { name: 'Sweep', exact: true }).click();
    await swept();
    const json = armload('sweep', MODEL, '--step', '120') as SweepJson;
    for (const { joint, checks } of json.joints) {
      const radial = checks.filter((row) => row.check === 'radial');
      expect(radial.length).toBeGreaterThan(0);
      for (const row of radial) {
        const what = `${row.bearing} radial`;
        await page.getByRole('button', { name: new RegExp(`go to the worst pose of ${joint} ${what}$`) }).click();
        const line = page.locator(`tr:has([data-check="${joint}/${what}"])`);
        const worst = Number(await line.locator('[data-worst]').getAttribute('data-worst'));
        // The proof polishes what the grid finds: never less, and the same where the grid was as good.
        expect(worst).toBeGreaterThanOrEqual(row.value * (1 - 1e-9));
        await expect.poll(() => numberIn(nowOf(joint, what)), PATIENT).toBeCloseTo(worst, 6);
        const load = await page.getByRole('combobox', { name: 'Case on stage' }).inputValue();
        const pose: string[] = [];
        for (const { name } of FILE.joints) {
          pose.push(await page.getByRole('spinbutton', { name: `Angle of ${name}` }).inputValue());
        }
        const at = armload('pose', MODEL, `--at=${pose.join(',')}`, '--case', load) as PoseJson;
        const own = at.results[0]!.joints.find((each) => each.joint === joint)!.bearings[row.bearing]!;
        // Angles are shown to a hundredth of a degree.
        expect(Math.abs(own.radial_N - worst) / worst).toBeLessThan(1e-3);
      }
    }
  });

  test('a broken file lists its mistakes and leaves the arm', async () => {
    const broken = readFileSync(MODEL, 'utf8').replace('"mass_kg"', '"mass_lb"').replace('"name"', '"nom"');
    await dropFile('broken.arm.json', broken);
    const alert = page.getByRole('alert');
    await alert.getByText('broken.arm.json was not opened').waitFor();
    expect(await alert.getByRole('row').count()).toBeGreaterThanOrEqual(4);
    await expect(alert.textContent()).resolves.toContain('mass_lb');
    await expect(page.getByRole('textbox', { name: 'Title' }).inputValue()).resolves.toBe(FILE.name);
    await alert.getByRole('button', { name: 'Close' }).click();
    await dropFile('no.json', '{ "armload": 1, ');
    await alert.getByText('no.json was not opened').waitFor();
    await alert.getByRole('button', { name: 'Close' }).click();
  });

  test('an edited span changes the loads, comes back on undo, and a bad number is refused with its reason', async () => {
    await page.getByRole('tab', { name: 'Joint' }).click();
    const [name] = ((await page.locator('.joint-cell.selected .cell-name').textContent()) ?? '').split('\n');
    const cell = nowOf(name!, 'A radial');
    const before = await numberIn(cell);
    const span = page.getByRole('spinbutton', { name: 'Span' });
    const typed = await span.inputValue();
    await span.fill('3.5 in');
    await span.press('Enter');
    await expect.poll(() => span.inputValue(), PATIENT).toBe('88.9');
    await expect.poll(() => numberIn(cell), PATIENT).not.toBe(before);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(() => span.inputValue(), PATIENT).toBe(typed);
    await expect.poll(() => numberIn(cell), PATIENT).toBe(before);
    await span.fill('-4');
    await span.press('Enter');
    await page.getByRole('alert').filter({ hasText: 'expected' }).waitFor();
    await span.press('Escape');
    await expect.poll(() => span.inputValue(), PATIENT).toBe(typed);
  });

  test('the arm, its edits and its pose are still there after a reload', async () => {
    const span = page.getByRole('spinbutton', { name: 'Span' });
    await span.fill('61.25');
    await span.press('Enter');
    const first = FILE.joints[0]!.name;
    await setAngle(first, 7);
    await page.waitForTimeout(900);
    await page.reload();
    await swept();
    await expect(page.getByRole('textbox', { name: 'Title' }).inputValue()).resolves.toBe(FILE.name);
    await expect(page.getByRole('spinbutton', { name: 'Span' }).inputValue()).resolves.toBe('61.25');
    await expect(page.getByRole('spinbutton', { name: `Angle of ${first}` }).inputValue()).resolves.toBe('7');
    expect(open.errors).toEqual([]);
  });

  test.each(['paper', 'night'])('no serious accessibility violation on the %s sheet, in any panel', async (tone) => {
    await page.getByRole('combobox', { name: 'Sheet' }).selectOption(tone);
    const axe = createRequire(import.meta.url).resolve('axe-core/axe.min.js');
    await page.addScriptTag({ path: axe });
    for (const panel of ['Joint', 'Checks', 'Shares', 'Pose map', 'Worst loads', 'Two ways', 'Cases']) {
      await page.getByRole('tab', { name: panel }).click();
      await page.waitForTimeout(300);
      const found = await page.evaluate(async () => {
        const { axe: tool } = window as unknown as { axe: { run(): Promise<{ violations: Violation[] }> } };
        interface Violation {
          id: string;
          impact: string;
          nodes: { html: string; failureSummary: string }[];
        }
        const { violations } = await tool.run();
        return violations
          .filter(({ impact }) => impact === 'serious' || impact === 'critical')
          .map(({ id, nodes }) => `${id}: ${nodes[0]?.html.slice(0, 160)} ${nodes[0]?.failureSummary}`);
      });
      expect(found, panel).toEqual([]);
    }
  });
});

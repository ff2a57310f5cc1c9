/** The proof in the browser's own workers: what it is handed to do, before and after an edit. */
import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { type OpenPage, openPage } from './browserPage.ts';

/** Four joints under weights alone: proved in a moment. */
function quickArm(): string {
  const file = JSON.parse(readFileSync('models/four-joint-vertical.arm.json', 'utf8')) as { cases: unknown[] };
  return JSON.stringify({ ...file, cases: file.cases.slice(0, 1) });
}

interface Watched {
  /** Chain indices of the joints of every part of a proof that was posted to a worker. */
  joints: number[];
}

let open: OpenPage;
let page: Page;

beforeAll(async () => {
  open = await openPage();
  page = open.page;
  await page.evaluate(() => {
    const watched: Watched = { joints: [] };
    Object.assign(window, { watched });
    const post = Worker.prototype.postMessage;
    Worker.prototype.postMessage = function (this: Worker, message: unknown, ...rest: never[]) {
      const { input } = message as { input?: { joints?: number[] } };
      if (input?.joints) watched.joints.push(...input.joints);
      return post.call(this, message, ...rest);
    };
  });
});

afterAll(() => open?.close());

async function handedOut(): Promise<readonly number[]> {
  const joints = await page.evaluate(() => (window as unknown as { watched: Watched }).watched.joints);
  return [...new Set(joints)].sort((a, b) => a - b);
}

/** Forgets what was handed out, does something that changes the arm, and waits for its proof. */
async function provedAfter(change: () => Promise<void>): Promise<readonly number[]> {
  await page.evaluate(() => {
    (window as unknown as { watched: Watched }).watched.joints = [];
  });
  await change();
  await expect.poll(handedOut, { timeout: 60_000 }).not.toEqual([]);
  await page
    .locator('.proof-state')
    .filter({ hasText: /^Proved/ })
    .waitFor({ timeout: 60_000 });
  return handedOut();
}

describe('the proof on the sheet', () => {
  test('searches every joint of an arm that is new', async () => {
    const joints = await provedAfter(async () => {
      const data = await page.evaluateHandle((text) => {
        const transfer = new DataTransfer();
        transfer.items.add(new File([text], 'quick.arm.json', { type: 'application/json' }));
        return transfer;
      }, quickArm());
      await page.locator('.sheet').dispatchEvent('drop', { dataTransfer: data });
    });
    // The arm that the page opened on may have been under way.
    expect(joints).toEqual(expect.arrayContaining([0, 1, 2, 3]));
  });

  test('searches the joint alone whose span is edited, and again on undo', async () => {
    await page.locator('.joint-cell').nth(1).click();
    await page.getByRole('tab', { name: 'Joint' }).click();
    const span = page.getByRole('spinbutton', { name: 'Span' });
    const edited = await provedAfter(async () => {
      await span.fill(String(Number(await span.inputValue()) + 7));
      await span.press('Enter');
    });
    expect(edited).toHaveLength(1);
    const undone = await provedAfter(() => page.getByRole('button', { name: 'Undo' }).click());
    expect(undone).toEqual(edited);
  });

  test('leaves no error behind', () => {
    expect(open.errors).toEqual([]);
  });
});

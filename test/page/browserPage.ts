/** The built page in a real Chromium, and the built command line beside it. */
import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { type Browser, chromium, type Page } from 'playwright-core';
import { type PreviewServer, preview } from 'vite';

const ARGUMENTS = [
  '--no-sandbox',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--enable-unsafe-swiftshader',
];
const KNOWN = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

export interface OpenPage {
  readonly page: Page;
  /** What the page reported as an error, so far. */
  readonly errors: readonly string[];
  readonly address: string;
  close(): Promise<void>;
}

function chromiumPath(): string {
  const path = [process.env.CHROME_PATH, ...KNOWN].find((each) => each && existsSync(each));
  if (!path) throw new Error('no Chromium: install it or name one in CHROME_PATH');
  return path;
}

/** Serves `dist/web` on a free port and opens it in a new browser. */
export async function openPage(options: { dark?: boolean; width?: number; height?: number } = {}): Promise<OpenPage> {
  if (!existsSync('dist/web/index.html')) throw new Error('the page is not built: run `npm run build`');
  const server: PreviewServer = await preview({
    build: { outDir: 'dist/web' },
    preview: { port: 0, host: '127.0.0.1', strictPort: false },
    logLevel: 'error',
  });
  const address = server.resolvedUrls?.local[0];
  if (!address) throw new Error('the page is not served');
  const browser: Browser = await chromium.launch({ executablePath: chromiumPath(), args: ARGUMENTS });
  const context = await browser.newContext({
    viewport: { width: options.width ?? 1440, height: options.height ?? 900 },
    colorScheme: options.dark ? 'dark' : 'light',
    reducedMotion: 'reduce',
  });
  const page = await context.newPage();
  const errors: string[] = [];
  page.on('pageerror', (error) => errors.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text());
  });
  await page.goto(address);
  return {
    page,
    errors,
    address,
    close: async () => {
      await browser.close();
      await server.close();
    },
  };
}

/** What the command line says, as JSON; its exit code may be 0 or 1 (a check is over its limit). */
export function armload(...words: string[]): unknown {
  try {
    return JSON.parse(execFileSync(process.execPath, ['dist/node/cli.js', ...words, '--json'], { encoding: 'utf8' }));
  } catch (error) {
    const { status, stdout } = error as { status?: number; stdout?: string };
    if (status === 1 && stdout) return JSON.parse(stdout);
    throw error;
  }
}

import { type ChildProcess, execFileSync, spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { createInterface } from 'node:readline';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';

/** The program under test, with its page inside; FELLREACH names another one. */
const binary = process.env.FELLREACH ?? resolve(import.meta.dirname, '../../../.build/fellreach');
const browsers = ['/usr/bin/chromium-headless-shell', '/usr/bin/chromium'];
const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** A Bench is the demo, served by the real program, and a browser to look at it. */
export class Bench {
  private constructor(
    readonly url: string,
    readonly plan: string,
    private readonly folder: string,
    private readonly server: ChildProcess,
    private readonly browser: Browser,
  ) {}

  static async open(): Promise<Bench> {
    const folder = mkdtempSync(join(tmpdir(), 'fellreach-'));
    const demo = join(folder, 'demo');
    execFileSync(binary, ['demo', demo, '--quiet'], { stdio: 'ignore' });
    const plan = join(demo, 'hallin.yaml');
    const server = spawn(binary, ['serve', plan, '--listen', '127.0.0.1:0'], { stdio: ['ignore', 'pipe', 'inherit'] });
    const url = await new Promise<string>((ok, no) => {
      createInterface({ input: server.stdout! }).once('line', ok);
      server.once('exit', (code) => no(new Error(`the server ended with ${code} before it had an address`)));
    });
    const executablePath = process.env.CHROMIUM ?? browsers.find((b) => existsSync(b));
    const browser = await chromium.launch({
      ...(executablePath ? { executablePath } : {}),
      chromiumSandbox: false,
      args: [
        '--use-gl=angle',
        '--use-angle=swiftshader',
        '--enable-unsafe-swiftshader',
        '--force-color-profile=srgb',
        '--font-render-hinting=none',
        '--hide-scrollbars',
      ],
    });
    return new Bench(url, plan, folder, server, browser);
  }

  async close(): Promise<void> {
    await this.browser.close();
    const ended = new Promise((ok) => this.server.once('exit', ok));
    this.server.kill('SIGTERM');
    await ended;
    rmSync(this.folder, { recursive: true });
  }

  /** What a command of the program prints as JSON. It ends with 3 where some link does not close. */
  command(...args: string[]): unknown {
    try {
      return JSON.parse(execFileSync(binary, [...args, '--format', 'json', '--quiet'], { encoding: 'utf8' }));
    } catch (error) {
      return JSON.parse((error as { stdout: string }).stdout);
    }
  }

  /** Opens the page and waits for its tables; the map comes later, see drawn. */
  async visit(hash = '', options: BrowserContextOptions = {}, before?: (page: Page) => Promise<void>): Promise<Visit> {
    const context = await this.browser.newContext({
      viewport: { width: 1280, height: 800 },
      deviceScaleFactor: 1,
      reducedMotion: 'reduce',
      locale: 'en-GB',
      timezoneId: 'UTC',
      serviceWorkers: 'block',
      ...options,
    });
    const page = await context.newPage();
    const visit = new Visit(page);
    await context.route('**/*', (route) => {
      if (route.request().url().startsWith(this.url)) return route.continue();
      visit.strange.push(route.request().url());
      return route.abort();
    });
    await page.addInitScript(() => {
      addEventListener('securitypolicyviolation', (e) =>
        console.error(`policy: ${e.violatedDirective} ${e.blockedURI}`),
      );
    });
    await before?.(page);
    await page.goto(this.url + hash);
    await page.locator('table.links td.figure').first().waitFor();
    return visit;
  }
}

/** A Visit is one page in the browser, and what went wrong on it. */
export class Visit {
  /** Requests that would have left the server. */
  readonly strange: string[] = [];
  /** Errors and warnings of any kind. */
  readonly wrong: string[] = [];

  constructor(readonly page: Page) {
    page.on('console', (m) => {
      if (['error', 'warning'].includes(m.type())) this.wrong.push(m.text());
    });
    page.on('pageerror', (e) => this.wrong.push(e.message));
    page.on('requestfailed', (r) => {
      if (r.failure()?.errorText !== 'net::ERR_ABORTED') this.wrong.push(`${r.url()} ${r.failure()?.errorText}`);
    });
  }

  /** Waits until the map has drawn all it has. */
  drawn = () => this.page.locator('#map[data-drawn]').waitFor({ timeout: 50_000 });

  link = (text: string) => this.page.locator('table.links button.pick', { hasText: text });

  /** The margin that the ledger shows. */
  margin = () => this.page.locator('table.ledger .total .figure').innerText();

  /** axe's findings on the page as it stands. */
  async axe(): Promise<string[]> {
    await this.page.evaluate(axeSource);
    return this.page.evaluate(async () => {
      const { axe } = globalThis as unknown as { axe: typeof import('axe-core') };
      const found = await axe.run({
        runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
      });
      // Sites stand where they stand: the criterion on the size of targets exempts places on maps, and the list of
      // sites does the same.
      const onMap = (target: unknown) => document.querySelector(String(target))?.closest('.maplibregl-marker') != null;
      return found.violations
        .map((v) => ({ id: v.id, nodes: v.nodes.filter((n) => v.id !== 'target-size' || !onMap(n.target[0])) }))
        .filter((v) => v.nodes.length > 0)
        .map(
          (v) =>
            `${v.id}: ${v.nodes
              .map((n) => `${n.target} ${n.any[0]?.message ?? ''}`)
              .slice(0, 4)
              .join(' | ')}`,
        );
    });
  }

  close = () => this.page.context().close();
}

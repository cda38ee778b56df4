import { readFileSync, writeFileSync } from 'node:fs';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Links } from '../src/api';
import { bearing, fixed, margin, signed } from '../src/format';
import { Bench, type Visit } from './harness';

let bench: Bench;
beforeAll(async () => {
  bench = await Bench.open();
});
afterAll(() => bench.close());

const thin = '#link=Gauge%203..Ormvik%2Fcoast';

/** Looks at a page and makes sure that nothing went wrong on it. */
async function looking(visit: Visit, look: (v: Visit) => Promise<void>) {
  await look(visit);
  expect(visit.strange).toEqual([]);
  expect(visit.wrong).toEqual([]);
  await visit.close();
}

test('the page opens with every link, and no request leaves the server', async () => {
  await looking(await bench.visit(), async (v) => {
    const { links } = bench.command('links', bench.plan) as Links;
    const rows = await v.page.locator('table.links tbody tr').allInnerTexts();
    expect(rows).toHaveLength(links.length);
    links.forEach((l, i) => {
      for (const part of [l.from, l.to, margin(l.margin_db), l.verdict]) expect(rows[i]).toContain(part);
    });
    await v.drawn();
  });
});

test('the links name their ends before they are worked out, and before the map', async () => {
  const visit = await bench.visit('', {}, async (page) => {
    await page.route('**/api/links*', async (route) => {
      await page.locator('table.links button.pick', { hasText: 'East Holm' }).waitFor();
      await route.continue();
    });
  });
  await looking(visit, async (v) => {
    await v.page.locator('table.links td.figure').first().waitFor();
  });
});

test('the ledger holds the figures of the links command, both ways, with their sources', async () => {
  await looking(await bench.visit(thin), async (v) => {
    const { links } = bench.command('links', bench.plan) as Links;
    const link = links.find((l) => l.from === 'Gauge 3' && l.to === 'Ormvik/coast')!;
    await v.page.getByLabel('All sources').check();
    for (const [i, d] of link.directions.entries()) {
      await v.page.locator('[aria-label="Direction of the ledger"] button').nth(i).click();
      await v.page.locator(`table.ledger caption`, { hasText: `from ${d.from}` }).waitFor({ state: 'attached' });
      const values = await v.page.locator('table.ledger .step:not(.total) .figure').allInnerTexts();
      expect(values).toEqual(d.lines.map((l) => signed(l.value_db)));
      expect(await v.margin()).toBe(`${margin(d.margin_db)} dB`);
      await expect.poll(() => v.page.locator('table.ledger .source').count()).toBe(d.lines.length);
      const sources = await v.page.locator('table.ledger .source').allInnerTexts();
      d.lines.forEach((l, n) => {
        expect(sources[n]).toContain(l.source);
      });
    }
  });
});

test('a click on a link of the map chooses it', async () => {
  await looking(await bench.visit(), async (v) => {
    await v.drawn();
    const at = await v.page.locator('.site[aria-label="Site Mouth Hill"]').boundingBox();
    const to = await v.page.locator('.site[aria-label="Site Gauge 3"]').boundingBox();
    const part = 0.25;
    await v.page.mouse.click(at!.x + 14 + (to!.x - at!.x) * part, at!.y + 14 + (to!.y - at!.y) * part);
    await v.page.locator('table.links tr.chosen', { hasText: 'Mouth Hill' }).waitFor();
    expect(v.page.url()).toContain('link=Gauge%203..Mouth%20Hill');
  });
});

test('the cursor of the section reads out the ground and moves a point on the map', async () => {
  await looking(await bench.visit(thin), async (v) => {
    await v.drawn();
    const section = v.page.getByRole('slider', { name: /^Section from/ });
    await section.hover({ position: { x: 300, y: 60 } });
    const walker = v.page.locator('.walker');
    await walker.waitFor();
    const before = await walker.boundingBox();
    expect(await v.page.locator('.readout').innerText()).toMatch(
      /km: ground .* m asl, ray .* of the first Fresnel radius/,
    );
    await section.focus();
    await v.page.keyboard.press('End');
    await expect.poll(() => section.getAttribute('aria-valuetext')).toContain('10.53 km');
    const after = await walker.boundingBox();
    expect(after!.x).toBeGreaterThan(before!.x + 20);
    for (let i = 0; i < 3; i++) await v.page.keyboard.press('Shift+ArrowLeft');
    await expect.poll(() => section.getAttribute('aria-valuetext')).not.toContain('10.53 km');
    await v.page.keyboard.press('Escape');
    await walker.waitFor({ state: 'detached' });
    const ends = ['Gauge 3', 'Ormvik'].map((name) => v.page.locator(`.site[aria-label="Site ${name}"]`).boundingBox());
    const [a, b] = await Promise.all(ends);
    await v.page.mouse.move(a!.x + 14 + (b!.x - a!.x) * 0.25, a!.y + 14 + (b!.y - a!.y) * 0.25);
    await expect.poll(() => v.page.locator('.readout').innerText()).toMatch(/^2\.\d\d km: ground/);
  });
});

test('a height dragged in the section moves the ledger, and undo brings it back', async () => {
  await looking(await bench.visit(thin), async (v) => {
    const before = await v.margin();
    const knob = v.page.getByRole('slider', { name: 'Antenna height at Gauge 3' });
    const box = (await knob.boundingBox())!;
    await v.page.mouse.move(box.x + 13, box.y + 13);
    await v.page.mouse.down();
    await v.page.mouse.move(box.x + 13, box.y - 10, { steps: 6 });
    await expect.poll(v.margin).not.toBe(before);
    await v.page.mouse.up();
    await v.page.locator('.bar .state', { hasText: '1 change' }).waitFor();
    await expect.poll(v.margin).not.toBe(before);
    await v.page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(v.margin).toBe(before);
    await v.page.locator('.bar .state', { hasText: 'as saved' }).waitFor();
  });
});

test('a site dragged on the map has live figures', async () => {
  await looking(await bench.visit(thin), async (v) => {
    await v.drawn();
    const distance = () => v.page.locator('table.links tr.chosen td').first().innerText();
    const before = await distance();
    const box = (await v.page.locator('.site[aria-label="Site Gauge 3"]').boundingBox())!;
    await v.page.mouse.move(box.x + 14, box.y + 14);
    await v.page.mouse.down();
    await v.page.mouse.move(box.x - 20, box.y - 10, { steps: 5 });
    await expect.poll(distance).not.toBe(before);
    const live = Number(await distance());
    await v.page.mouse.up();
    await v.page.locator('.bar .state', { hasText: '1 change' }).waitFor();
    await expect.poll(async () => Number(await distance())).toBeGreaterThan(Number(before));
    expect(live).toBeGreaterThan(Number(before));
  });
});

test('a cell of the height table is tried, and the ledger has its margin', async () => {
  await looking(await bench.visit(thin), async (v) => {
    const cell = v.page.locator('table.heights button', { hasText: '+' }).last();
    await cell.waitFor();
    const promised = (await cell.innerText()).trim();
    await cell.click();
    await expect.poll(v.margin).toBe(`${promised} dB`);
    expect(await v.page.locator('body > [role=status]').innerText()).toContain('Gauge 3');
  });
});

test('keys alone choose a link, move a site, raise an antenna and save; a reload shows the file', async () => {
  await looking(await bench.visit(), async (v) => {
    await v.drawn();
    await v.link('East Holm').focus();
    await v.page.keyboard.press('Enter');
    await v.page.locator('table.links tr.chosen', { hasText: 'East Holm' }).waitFor();
    const site = v.page.locator('.site[aria-label="Site East Holm"]');
    await site.focus();
    await v.page.keyboard.press('Shift+ArrowUp');
    await v.page.locator('.bar .state', { hasText: '1 change' }).waitFor();
    const knob = v.page.getByRole('slider', { name: 'Antenna height at East Holm' });
    await knob.focus();
    await v.page.keyboard.press('ArrowUp');
    await v.page.locator('.bar .state', { hasText: '2 changes' }).waitFor();
    const tried = await v.margin();
    await v.page.keyboard.press('Control+s');
    await v.page.locator('.bar .state', { hasText: 'as saved' }).waitFor();
    const text = readFileSync(bench.plan, 'utf8');
    expect(text).toContain('# gauges of the ridge');
    expect(text).toContain('above_ground: "7 m"');
    await v.page.reload();
    await expect.poll(v.margin).toBe(tried);
  });
});

test('a file changed by others meanwhile is not written over', async () => {
  const visit = await bench.visit(thin);
  const text = readFileSync(bench.plan, 'utf8');
  await visit.page.locator('table.heights button').first().click();
  await visit.page.locator('.bar .state', { hasText: '1 change' }).waitFor();
  writeFileSync(bench.plan, text.replace('Hallin river gauges', 'Hallin gauges'));
  await visit.page.getByRole('button', { name: 'Save' }).click();
  await visit.page.locator('.trouble', { hasText: 'changed' }).waitFor();
  expect(readFileSync(bench.plan, 'utf8')).toContain('title: Hallin gauges');
  await visit.page.getByRole('button', { name: 'Read the file again' }).click();
  await visit.page.locator('.bar h1', { hasText: 'Hallin gauges' }).waitFor();
  writeFileSync(bench.plan, text);
  await visit.close();
});

test('what the server refuses is told with what to do', async () => {
  const visit = await bench.visit(thin);
  await visit.page.locator('.sites summary', { hasText: 'Gauge 3' }).click();
  const place = visit.page.locator('.sites details[open] input').first();
  await place.fill('nowhere');
  await place.press('Enter');
  const trouble = visit.page.locator('.trouble');
  await trouble.waitFor();
  expect(await trouble.innerText()).toMatch(/line \d+/);
  expect(await visit.axe()).toEqual([]);
  await visit.close();
});

test('distance and bearing are measured between two places, sites among them', async () => {
  await looking(await bench.visit(), async (v) => {
    const { links } = bench.command('links', bench.plan) as Links;
    const link = links.find((l) => l.from === 'Gauge 3' && l.to === 'Mouth Hill')!;
    await v.drawn();
    await v.page.getByRole('button', { name: /^Measure/ }).click();
    await v.page.locator('.site[aria-label="Site Gauge 3"]').click();
    await v.page.locator('.site[aria-label="Site Mouth Hill"]').click();
    const said = `${fixed(link.distance_km, 2)} km, ${bearing(link.azimuth_deg)}° there, ${bearing(link.back_azimuth_deg)}° back`;
    await v.page.locator('.map-word.top', { hasText: said }).waitFor();
    await v.page.locator('#map').click({ position: { x: 60, y: 400 } });
    await v.page.locator('.map-word.top', { hasText: 'second place' }).waitFor();
    await v.page.locator('.map-word.place', { hasText: 'UTM 27N' }).waitFor();
  });
});

test('coverage is mapped to its end, drawn and read out; bands follow', async () => {
  await looking(await bench.visit(), async (v) => {
    await v.drawn();
    const { width, height } = (await v.page.locator('#map').boundingBox())!;
    const clip = { x: width * 0.45, y: height * 0.4, width: 60, height: 60 };
    const picture = async () => (await v.page.screenshot({ clip })).toString('base64');
    const before = await picture();
    await v.page.getByRole('button', { name: /^Map the coverage/ }).click();
    await v.page.locator('progress').waitFor();
    await v.page.locator('.key', { hasText: '40 dB and more' }).waitFor();
    await expect.poll(picture).not.toBe(before);
    const margin = await picture();
    await v.page.mouse.move(width * 0.45, height * 0.5);
    await v.page.locator('.map-word.place', { hasText: /margin [+−]?\d+\.\d dB|no coverage/ }).waitFor();
    expect(v.page.url()).toContain('cover=Hallin%20Top%2Fgauges');
    await v.page.getByRole('button', { name: 'Bands', exact: true }).click();
    await expect.poll(picture).not.toBe(margin);
    expect(await v.axe()).toEqual([]);
    await v.page.getByRole('button', { name: 'Nothing' }).click();
    await expect.poll(picture).toBe(before);
  });
});

test('a coverage job can be cancelled', async () => {
  await looking(await bench.visit(), async (v) => {
    await v.page.getByRole('button', { name: /^Map the coverage/ }).click();
    await v.page.getByRole('button', { name: 'Cancel' }).click();
    await v.page.locator('.hint', { hasText: 'given up' }).waitFor();
    await v.page.getByRole('button', { name: /^Map the coverage/ }).click();
    await v.page.locator('table', { hasText: 'Area by margin' }).waitFor();
  });
});

for (const colorScheme of ['light', 'dark'] as const) {
  test(`axe finds nothing in ${colorScheme}`, async () => {
    await looking(await bench.visit(thin, { colorScheme }), async (v) => {
      await v.drawn();
      await v.page.locator('table.heights').waitFor();
      await v.page.locator('svg.vswr').waitFor();
      expect(await v.axe()).toEqual([]);
      await v.page.getByLabel('All sources').check();
      await v.page.evaluate(() => {
        for (const details of document.querySelectorAll('details')) details.open = true;
      });
      expect(await v.axe()).toEqual([]);
    });
  });
}

// A window of 1280 by 800 at 200 % has 640 by 400 of the page's pixels.
for (const [width, height] of [
  [360, 740],
  [640, 400],
] as const) {
  test(`at ${width} by ${height} nothing scrolls sideways`, async () => {
    await looking(await bench.visit(thin, { viewport: { width, height }, hasTouch: true }), async (v) => {
      await v.drawn();
      await v.page.locator('table.heights').waitFor();
      expect(await v.page.evaluate(() => document.documentElement.scrollWidth)).toBe(width);
      expect(await v.axe()).toEqual([]);
    });
  });
}

test('without WebGL the page says so, and tables and section work', async () => {
  const visit = await bench.visit(thin, {}, async (page) => {
    await page.addInitScript(() => {
      const get = HTMLCanvasElement.prototype.getContext;
      HTMLCanvasElement.prototype.getContext = function (this: HTMLCanvasElement, kind: string, ...more: unknown[]) {
        return kind.startsWith('webgl') ? null : (get as (...a: unknown[]) => unknown).call(this, kind, ...more);
      } as typeof get;
    });
  });
  await visit.page.locator('.cover-note', { hasText: 'WebGL' }).waitFor();
  await visit.page.getByRole('slider', { name: /^Section from/ }).waitFor();
  expect(await visit.margin()).toMatch(/dB$/);
  expect(await visit.axe()).toEqual([]);
  await visit.close();
});

test('a file that breaks on disk is told, and the last good plan stays', async () => {
  const visit = await bench.visit(thin);
  const text = readFileSync(bench.plan, 'utf8');
  const before = await visit.margin();
  writeFileSync(bench.plan, text.replace('power: "10 W"', 'power: "10 cats"'));
  await visit.page.evaluate(() => window.dispatchEvent(new Event('focus')));
  await visit.page.locator('.trouble', { hasText: /line \d+ radios.base.power/ }).waitFor();
  expect(await visit.margin()).toBe(before);
  writeFileSync(bench.plan, text);
  await visit.page.evaluate(() => window.dispatchEvent(new Event('focus')));
  await visit.page.locator('.trouble').waitFor({ state: 'detached' });
  await visit.close();
});

test('a GeoJSON file of the user is drawn, another file is refused', async () => {
  const visit = await bench.visit();
  await visit.drawn();
  await visit.page.locator('.menu summary').click();
  const pick = visit.page.locator('.menu input[type=file]');
  await pick.setInputFiles({ name: 'notes.txt', mimeType: 'text/plain', buffer: Buffer.from('no map') });
  await visit.page.locator('.trouble', { hasText: 'notes.txt is no GeoJSON' }).waitFor();
  const { width, height } = (await visit.page.locator('#map').boundingBox())!;
  const clip = { x: width * 0.3, y: height * 0.75, width: 80, height: 80 };
  const picture = async () => (await visit.page.screenshot({ clip })).toString('base64');
  const before = await picture();
  const area = [
    [-20.4, 47.3],
    [-19.6, 47.3],
    [-19.6, 47.7],
    [-20.4, 47.7],
    [-20.4, 47.3],
  ];
  const buffer = Buffer.from(JSON.stringify({ type: 'Polygon', coordinates: [area] }));
  await pick.setInputFiles({ name: 'area.geojson', mimeType: 'application/geo+json', buffer });
  await expect.poll(picture).not.toBe(before);
  await visit.close();
});

test('a server that has gone is told, and what was there stays', async () => {
  const visit = await bench.visit(thin);
  const cell = visit.page.locator('table.heights button').first();
  await cell.waitFor();
  const before = await visit.margin();
  await visit.page.route('**/api/try', (route) => route.abort('connectionrefused'));
  await cell.click();
  await visit.page.locator('.trouble', { hasText: 'does not answer' }).waitFor();
  expect(await visit.margin()).toBe(before);
  await visit.close();
});

test('a site and a link are added and removed again by undo', async () => {
  await looking(await bench.visit(), async (v) => {
    await v.drawn();
    await v.page.locator('summary', { hasText: 'Add a site' }).click();
    await v.page.getByLabel('Name').fill('Cairn');
    await v.page.getByRole('button', { name: 'Add', exact: true }).click();
    await v.page.locator('.site[aria-label="Site Cairn"]').waitFor();
    await v.page.locator('summary', { hasText: 'Add a link' }).click();
    await v.page.locator('select[name=from]').selectOption('Cairn');
    await v.page.locator('select[name=to]').selectOption('Mouth Hill');
    await v.page.getByRole('button', { name: 'Add', exact: true }).click();
    await v.link('Cairn').waitFor();
    await v.page.keyboard.press('Control+z');
    await v.link('Cairn').waitFor({ state: 'detached' });
    await v.page.keyboard.press('Control+z');
    await v.page.locator('.site[aria-label="Site Cairn"]').waitFor({ state: 'detached' });
    await v.page.locator('.bar .state', { hasText: 'as saved' }).waitFor();
  });
});

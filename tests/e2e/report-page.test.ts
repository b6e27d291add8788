import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { recordLine } from '../../src/study/record-line.js';
import { runCommand } from '../commands/run-command.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { type BrowserPage, openBrowser } from './harness/chromium.js';

/** What can be seen of the page at its present width. */
const seen = `(() => {
  const svgs = [...document.querySelectorAll('svg')];
  const bars = [...document.querySelectorAll('rect.bar')].filter((bar) => bar.getBoundingClientRect().width > 3);
  const texts = [...document.querySelectorAll('p, li, td, th, figcaption, svg text')];
  const size = (element) => {
    const svg = element.closest('svg');
    const scale = svg === null ? 1 : svg.getBoundingClientRect().width / svg.viewBox.baseVal.width;
    return parseFloat(getComputedStyle(element).fontSize) * scale;
  };
  const hit = (bar) => {
    bar.scrollIntoView({ block: 'center' });
    const { left, top, width, height } = bar.getBoundingClientRect();
    return document.elementFromPoint(left + width / 2, top + height / 2) === bar;
  };
  const outside = [...document.querySelectorAll('body *')].filter((element) => {
    const { left, right, width } = element.getBoundingClientRect();
    return width > 0 && (left < -1 || right > document.documentElement.clientWidth + 1);
  });
  const cut = [...document.querySelectorAll('svg')].flatMap((svg) => {
    const box = svg.getBoundingClientRect();
    return [...svg.querySelectorAll('text')].filter((text) => {
      const { left, right, top, bottom } = text.getBoundingClientRect();
      return left < box.left - 1 || right > box.right + 1 || top < box.top - 1 || bottom > box.bottom + 1;
    }).map((text) => text.textContent);
  });
  return {
    plots: svgs.length,
    plotsShown: svgs.filter((svg) => svg.getBoundingClientRect().width > 200 && svg.getBoundingClientRect().height > 15).length,
    bars: bars.length,
    barsHit: bars.filter(hit).length,
    blue: bars.filter((bar) => getComputedStyle(bar).fill === 'rgb(0, 114, 178)').length,
    lines: document.querySelectorAll('polyline.line').length,
    smallest: Math.min(...texts.map(size)),
    outside: outside.length,
    cut,
    wide: document.documentElement.scrollWidth,
  };
})()`;

interface Seen {
  readonly plots: number;
  readonly plotsShown: number;
  readonly bars: number;
  readonly barsHit: number;
  readonly blue: number;
  readonly lines: number;
  readonly smallest: number;
  readonly outside: number;
  readonly cut: readonly string[];
  readonly wide: number;
}

async function open(): Promise<BrowserPage> {
  const folder = temporaryFolder();
  const records = join(folder, 'records.jsonl');
  writeFileSync(records, [...inventedRecords(1500, 3)].map((record) => `${recordLine(record)}\n`).join(''));
  const html = join(folder, 'report.html');
  const { exit } = await runCommand(['records', 'report', records, '--html', html], { homeFolder: folder });
  expect(exit).toBe(0);
  const page = await openBrowser();
  await page.call('Emulation.setDeviceMetricsOverride', { width: 800, height: 1000, deviceScaleFactor: 1, mobile: false });
  const loaded = page.next('Page.loadEventFired');
  await page.call('Page.navigate', { url: pathToFileURL(html).href });
  await loaded;
  return page;
}

describe('the HTML page of the report, in a browser', () => {
  it('shows its plots at 800 pixels, asks for nothing and complains of nothing; prints on A4', async () => {
    const page = await open();
    const at800 = await page.evaluate<Seen>(seen);
    expect(at800.plots).toBeGreaterThan(30);
    expect(at800.plotsShown).toBe(at800.plots);
    expect(at800.bars).toBeGreaterThan(60);
    expect([at800.barsHit, at800.blue]).toEqual([at800.bars, at800.bars]);
    expect(at800.lines).toBeGreaterThan(5);
    expect(at800.smallest).toBeGreaterThanOrEqual(11);
    expect([at800.outside, at800.cut, at800.wide <= 800]).toEqual([0, [], true]);

    const complaints = page.events.filter(({ method }) =>
      ['Log.entryAdded', 'Runtime.exceptionThrown', 'Runtime.consoleAPICalled'].includes(method),
    );
    expect(complaints).toEqual([]);
    const asked = page.events
      .filter(({ method }) => method === 'Network.requestWillBeSent')
      .map(({ params }) => (params as { request: { url: string } }).request.url)
      .filter((url) => !url.startsWith('data:'));
    expect(asked.every((url) => url.startsWith('file:') && url.endsWith('report.html'))).toBe(true);
    expect(asked.length).toBeLessThanOrEqual(1);

    // A4 less 15 mm on both sides is 180 mm: 680 pixels of 1/96 inch.
    await page.call('Emulation.setEmulatedMedia', { media: 'print' });
    await page.call('Emulation.setDeviceMetricsOverride', { width: 680, height: 1000, deviceScaleFactor: 1, mobile: false });
    const onPaper = await page.evaluate<Seen>(seen);
    expect([onPaper.plotsShown, onPaper.outside, onPaper.cut, onPaper.wide <= 680]).toEqual([onPaper.plots, 0, [], true]);
    expect(onPaper.smallest).toBeGreaterThanOrEqual(10);
    const { data } = await page.call<{ data: string }>('Page.printToPDF', { preferCSSPageSize: true, printBackground: false });
    const pdf = Buffer.from(data, 'base64').toString('latin1');
    expect(pdf.startsWith('%PDF-')).toBe(true);
    const boxes = [...pdf.matchAll(/\/MediaBox \[\s*0 0 ([\d.]+) ([\d.]+)\s*\]/g)].map(([, width, height]) => [
      Number(width),
      Number(height),
    ]);
    expect(boxes.length).toBeGreaterThan(0);
    // 210 by 297 mm in points of 1/72 inch.
    for (const [width, height] of boxes) {
      expect(Math.abs(width! - 595.28)).toBeLessThan(1);
      expect(Math.abs(height! - 841.89)).toBeLessThan(1);
    }
  });
});

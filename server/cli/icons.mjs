// `node server/cli/icons.mjs`: draws every icon from assets/images/mark.svg with Chromium. Run it after a change of the
// mark and commit what it writes; the build only copies the pictures.
import { chromium } from 'playwright-core';
import fs from 'node:fs';
import { chromiumPath, fromRoot, say } from './tools.mjs';

const ground = '#F2ECDF';
// share: width of the mark within the picture. A maskable icon may be cut to a circle of 80 % of its width.
const icons = [
  { file: 'assets/images/favicon.png', px: 64, share: 1, ground: 'transparent' },
  { file: 'assets/web/icon-192.png', px: 192, share: 0.72, ground },
  { file: 'assets/web/icon-512.png', px: 512, share: 0.72, ground },
  { file: 'assets/web/icon-maskable-512.png', px: 512, share: 0.54, ground },
  { file: 'assets/web/apple-touch-icon.png', px: 180, share: 0.66, ground },
  // The status-bar badge of a notification: only its alpha channel is looked at.
  { file: 'assets/web/badge-96.png', px: 96, share: 0.9, ground: 'transparent' },
];

const executablePath = chromiumPath();
if (!executablePath) {
  console.error('bidewell: drawing icons needs Chromium (apt-get install chromium)');
  process.exit(1);
}
const mark = fs.readFileSync(fromRoot('assets/images/mark.svg'), 'utf8');
const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu'] });
const page = await browser.newPage();
for (const icon of icons) {
  const size = Math.round(icon.px * icon.share);
  await page.setViewportSize({ width: icon.px, height: icon.px });
  await page.setContent(
    `<style>html,body{margin:0;height:100%;background:${icon.ground}}body{display:grid;place-items:center}svg{width:${size}px;height:${size}px}</style>${mark}`,
  );
  await page.screenshot({ path: fromRoot(icon.file), omitBackground: true });
  say(`${icon.file} ${icon.px} px`);
}
await browser.close();

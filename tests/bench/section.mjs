// What the full-wave section costs as WebAssembly, in Chromium:  ninja -C build/web bench_section, then
// node tests/bench/section.mjs  (after  npm install  in tests/browser). Prints what tests/bench/section.cpp prints.
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { built, launch } from '../browser/page.mjs';

const browser = await launch();
const page = await browser.newPage();
const done = new Promise((end) => {
    page.on('console', (message) => {
        console.log(message.text());
        if (message.text().includes('field across')) end();  // its last row
    });
    page.on('pageerror', (error) => end(console.error(String(error))));
});
page.addScriptTag({ content: readFileSync(join(built, '../bench_section.js'), 'utf8') });
await done;
await browser.close();

// Pictures of the page for a person to look at:  node tests/browser/shots.mjs FOLDER [VIEW ...]
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { Visit, launch } from './page.mjs';

const [folder, ...views] = process.argv.slice(2);
if (!folder) {
    console.error('usage: node tests/browser/shots.mjs FOLDER [VIEW ...]');
    process.exit(2);
}
mkdirSync(folder, { recursive: true });
const browser = await launch();
for (const device of ['phone', 'tablet', 'desktop'])
    for (const colorScheme of ['light', 'dark']) {
        const visit = await Visit.open(browser, device, { colorScheme });
        for (const view of views.length ? views : ['beam', 'pulse', 'pair', 'lanes']) {
            await visit.tap(`view.${view}`);
            await visit.page.screenshot({ path: join(folder, `${device}-${colorScheme}-${view}.png`) });
        }
        await visit.end();
    }
await browser.close();

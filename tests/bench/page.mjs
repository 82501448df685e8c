// What the page costs:  node tests/bench/page.mjs  (after  bash web/serve.sh --build-only  and  npm install  in tests/browser)
import { readFileSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { Visit, built, launch } from '../browser/page.mjs';

const size = (name) => statSync(join(built, name)).size;
const rows = readdirSync(built).filter((name) => !/\.(gz|br)$/.test(name) && name !== 'groundgrain.html').map((name) => {
    const packed = (ending) => (readdirSync(built).includes(name + ending) ? size(name + ending) : size(name));
    return [name, size(name), packed('.gz'), packed('.br')];
});
const sum = (column) => rows.reduce((total, row) => total + row[column], 0);
console.log('bytes                                      raw      gzip    brotli');
for (const [name, ...bytes] of [...rows, ['the whole page', sum(1), sum(2), sum(3)]])
    console.log(name.padEnd(36), ...bytes.map((n) => String(n).padStart(9)));
const single = readFileSync(join(built, 'groundgrain.html'));
console.log('groundgrain.html'.padEnd(36), String(single.length).padStart(9), String(gzipSync(single, { level: 9 }).length).padStart(9));

const browser = await launch();
const middle = (values) => values.sort((a, b) => a - b)[Math.floor(values.length / 2)];
for (const slow of [1, 4]) {
    const times = [];
    for (let i = 0; i < 5; ++i) {
        const visit = await Visit.begin(browser, 'phone');
        const session = await visit.context.newCDPSession(visit.page);
        await session.send('Emulation.setCPUThrottlingRate', { rate: slow });
        await visit.go();
        times.push(await visit.page.evaluate(() => performance.getEntriesByName('answers')[0].startTime));
        await visit.end();
    }
    console.log(`navigation to first answers, phone, CPU ${slow}x slower: ${middle(times).toFixed(0)} ms (median of ${times.length})`);
}
const visit = await Visit.open(browser, 'phone');
await visit.page.waitForTimeout(2000);
const frames = await visit.frames();
await visit.page.waitForTimeout(10000);
console.log(`frames drawn in ten idle seconds: ${(await visit.frames()) - frames}`);
await visit.end();
await browser.close();

// Pair's section: computed by a worker beside the page, which goes on drawing.
import assert from 'node:assert/strict';
import { after, before, test } from 'node:test';
import { Visit, built, launch } from './page.mjs';

let browser;
before(async () => (browser = await launch()));
after(() => browser.close());

const reckoner = (visit) => visit.page.evaluate(() => window.groundgrain.reckoner());
const picture = async (visit) => (await visit.control('picture')).value;
/// Until the least gaps are measured.
const measured = (visit) =>
    visit.page.waitForFunction(
        () => / raw, /.test(window.groundgrain.controls().find((c) => c.id === 'picture').value), null, { polling: 50, timeout: 60000 });

/// Answers of workers begun from now on wait in the page until letThrough() is called there.
const holdAnswers = (visit) =>
    visit.page.addInitScript(() => {
        const held = [];
        let open = false;
        const Original = window.Worker;
        window.Worker = class extends Original {
            set onmessage(take) {
                super.onmessage = (event) => (open || event.data === 'ready' ? take(event) : held.push(() => take(event)));
            }
        };
        window.heldAnswers = () => held.length;
        window.letThrough = () => {
            open = true;
            held.splice(0).forEach((give) => give());
        };
    });

for (const device of ['phone', 'desktop'])
    test(`on a ${device}, the first look at Pair starts a worker, and everything comes from it`, async () => {
        const visit = await Visit.open(browser, device);
        assert.equal(visit.page.workers().length, 0, 'none before it is needed');
        await visit.tap('view.pair');
        await measured(visit);
        assert.equal(visit.page.workers().length, 1);
        // The section, its focused picture, two searches, and their ranges.
        await visit.page.waitForFunction(() => window.groundgrain.reckoner().answers >= 5, null, { polling: 50, timeout: 60000 });
        await visit.settle();
        assert.deepEqual(await reckoner(visit), { by: 'worker', waiting: false, answers: 5 });
        const frames = await visit.frames();
        await visit.page.waitForTimeout(3000);
        assert.equal(await visit.frames(), frames, 'then nothing moves');
        assert.ok(await visit.find('section.gain'), 'the switches of a section are there');
        assert.match((await visit.answer('apart.sideways')).says, /\d/);
        assert.ok(await visit.answer('apart.focused'), 'the answers have taken in what was measured');
        assert.deepEqual(visit.complaints, []);
        assert.deepEqual(visit.foreign, []);
        await visit.end();
    });

test('while the section is computed frames go on, the picture says so and keeps the last section', async () => {
    const visit = await Visit.begin(browser, 'desktop');
    await holdAnswers(visit);
    await visit.go();
    const { x, y } = (await visit.control('view.pair')).middle;
    await visit.page.mouse.click(x, y);
    await visit.page.waitForFunction(() => window.heldAnswers() === 1, null, { timeout: 30000 });
    await visit.page.waitForFunction(
        () => window.groundgrain.controls().find((c) => c.id === 'picture').value.includes('being computed'), null, { timeout: 10000 });
    assert.equal(await visit.find('section.gain'), undefined);
    await visit.page.evaluate(() => window.letThrough());
    await measured(visit);

    // The same with a section there already: it stays while a grip moves and the answers are on their way.
    const again = await Visit.begin(browser, 'desktop');
    await holdAnswers(again);
    await again.go();
    await again.page.evaluate(() => {
        window.letThrough();
    });
    await again.tap('view.pair');
    await measured(again);
    const grip = (await again.control('handle.target.gap')).middle;
    await again.page.mouse.move(grip.x, grip.y);
    await again.page.mouse.down();
    const frames = await again.frames();
    const places = 20;
    for (let i = 1; i <= places; ++i) {
        await again.page.mouse.move(grip.x + 2 * i, grip.y);
        await again.page.evaluate(() => new Promise(requestAnimationFrame));
        assert.ok(await again.find('section.gain'), 'a section is shown all along');
    }
    assert.ok((await again.frames()) - frames >= places / 2, 'a frame for every move, or nearly');
    assert.match(await picture(again), /Two at \d/);
    await again.page.mouse.up();
    await measured(again);
    assert.equal((await reckoner(again)).by, 'worker');
    assert.deepEqual(again.complaints, []);
    await again.end();
    await visit.end();
});

test('the single file computes in a worker, too', async () => {
    const visit = await Visit.begin(browser, 'desktop', { address: `file://${built}/` });
    await visit.go('groundgrain.html');
    await visit.tap('view.pair');
    await measured(visit);
    assert.equal((await reckoner(visit)).by, 'worker');
    assert.equal(visit.page.workers().length, 1);
    assert.deepEqual(visit.complaints, []);
    await visit.end();
});

test('the section comes without a network as well', async () => {
    const visit = await Visit.open(browser, 'phone');
    await visit.page.evaluate(() => navigator.serviceWorker.ready);
    await visit.page.waitForFunction(() => navigator.serviceWorker.controller !== null);
    await visit.server.close();
    visit.server = null;
    await visit.context.setOffline(true);
    await visit.go();
    await visit.tap('view.pair');
    await measured(visit);
    assert.equal((await reckoner(visit)).by, 'worker');
    assert.deepEqual(visit.complaints, []);
    await visit.end();
});

for (const [how, refuse] of [
    ['that has no workers', () => delete window.Worker],
    ['that forbids them', () => (window.Worker = class { constructor() { throw new DOMException('no', 'SecurityError'); } })],
    ['whose workers cannot start', () => {
        const Original = window.Worker;
        window.Worker = class extends Original { constructor() { super('data:text/javascript,throw 1'); } };
    }],
])
    test(`in a browser ${how} the page computes the section itself`, async () => {
        const visit = await Visit.begin(browser, 'phone');
        await visit.page.addInitScript(refuse);
        await visit.go();
        await visit.tap('view.pair');
        await measured(visit);
        assert.equal((await reckoner(visit)).by, 'page');
        assert.equal(await visit.page.locator('#loading').isVisible(), false);
        await visit.end();
    });

test('a worker that breaks over an order leaves a sentence, and the next order starts another', async () => {
    const visit = await Visit.begin(browser, 'desktop');
    await visit.page.addInitScript(() => {
        const Original = window.Worker;
        let first = true;
        window.Worker = class extends Original {
            constructor(address) {
                super(address);
                this.breaks = first;
                first = false;
                this.addEventListener('message', () => this.breaks && setTimeout(() => this.dispatchEvent(new ErrorEvent('error'))));
            }
            postMessage(data) {
                if (data.wasm || !this.breaks) super.postMessage(data);
            }
        };
    });
    await visit.go();
    await visit.tap('view.pair');
    assert.equal(await visit.find('section.gain'), undefined);
    assert.equal((await reckoner(visit)).waiting, false);
    await visit.tap('field.target.depth.more');
    await measured(visit);
    assert.equal((await reckoner(visit)).by, 'worker');
    await visit.end();
});

test('a browser that is too old is told which are new enough', async () => {
    const visit = await Visit.begin(browser, 'phone');
    await visit.page.addInitScript(() => (WebAssembly.validate = () => false)); // knows no vectors
    await visit.page.goto(visit.address);
    const said = visit.page.locator('#loading');
    await visit.page.waitForFunction(() => /could not start/.test(document.getElementById('loading').textContent), null, { timeout: 10000 });
    assert.match(await said.innerText(), /Chrome or Edge from 91 on, Firefox from \d+, Safari from 16\.4/);
    assert.equal(await said.isVisible(), true);
    await visit.end();
});

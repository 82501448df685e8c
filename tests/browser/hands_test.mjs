// Fingers, mouse and keyboard on the pictures and the fields.
import assert from 'node:assert/strict';
import { after, before, test } from 'node:test';
import { Visit, launch } from './page.mjs';

let browser;
before(async () => (browser = await launch()));
after(() => browser.close());

/// What is dragged on each picture, how far, and an answer that has to follow; the picture's own sentence has to anyway.
const drags = [
    { view: 'beam', handle: 'target.depth', by: [0, 40], answer: 'patch.along' },
    { view: 'pulse', handle: 'pass.window', by: [-60, 0], answer: 'pass.reach' },
    { view: 'pair', handle: 'target.gap', by: [30, 0], answer: null },
    { view: 'lanes', handle: 'lanes.spacing', by: [25, 25], answer: 'lanes.hits' },
];
/// The number at a path of the plan; of a range its likely value.
const at = (plan, path) => {
    const value = path.split('.').reduce((part, key) => part?.[key], plan);
    return Array.isArray(value) ? value[1] : value;
};

for (const device of ['phone', 'desktop'])
    for (const { view, handle, by, answer } of drags)
        test(`on a ${device}, a drag on ${view} changes the plan and its answers; undo takes it back`, async () => {
            const visit = await Visit.open(browser, device);
            await visit.tap(`view.${view}`);
            const before = await visit.plan();
            const said = async () => JSON.stringify([answer && (await visit.answer(answer)), (await visit.control('picture')).value]);
            const answered = await said();
            await visit.drag(`handle.${handle}`, ...by);
            const plan = await visit.plan();
            assert.notDeepEqual(at(plan, handle), at(before, handle), `${handle} moved`);
            // Nothing else was touched by the way.
            const others = (whole) => JSON.stringify(whole, (key, value) => (key === handle.split('.')[1] ? undefined : value));
            assert.equal(others(plan), others(before));
            assert.notEqual(await said(), answered);
            if (device === 'desktop') {
                await visit.page.keyboard.press('Control+z');
                await visit.settle();
                assert.deepEqual(await visit.plan(), before);
            }
            assert.deepEqual(visit.complaints, []);
            await visit.end();
        });

test('a number is typed on the phone with the keypad', async () => {
    const visit = await Visit.open(browser, 'phone');
    await visit.tap('field.target.depth');
    for (const key of ['1', 'point', '2', '5']) await visit.tap(`key.${key}`);
    assert.equal((await visit.control('typed')).value, '1.25');
    await visit.tap('key.ok');
    assert.deepEqual(at(await visit.plan(), 'target.depth'), 1.25);
    await visit.end();
});

test('a number is typed on the desktop, with a comma too', async () => {
    const visit = await Visit.open(browser, 'desktop');
    await visit.tap('field.target.depth');
    await visit.page.keyboard.type('1,4');
    await visit.page.keyboard.press('Enter');
    await visit.settle();
    assert.deepEqual(at(await visit.plan(), 'target.depth'), 1.4);
    await visit.end();
});

for (const device of ['phone', 'desktop'])
    test(`on a ${device}, a number that cannot be stays as typed, says why, and leaves the answers alone`, async () => {
        const visit = await Visit.open(browser, device);
        const before = await visit.plan();
        const answers = await visit.answers();
        const spoken = await visit.page.locator('#status').textContent();
        await visit.tap('field.target.depth');
        if (visit.touch) {
            for (const key of ['9', '9', '9', '9']) await visit.tap(`key.${key}`);
            await visit.tap('key.ok');
        } else {
            await visit.page.keyboard.type('9999');
            await visit.page.keyboard.press('Enter');
            await visit.settle();
        }
        const typed = await visit.control((c) => c.role === 'spinbutton' && c.value.startsWith('9999'));
        assert.ok(typed);
        assert.deepEqual(await visit.plan(), before);
        assert.deepEqual(await visit.answers(), answers);
        // The sentence is said to a screen reader as well.
        await visit.page.waitForFunction(
            (old) => document.getElementById('status').textContent !== old && /\d/.test(document.getElementById('status').textContent),
            spoken, { timeout: 5000 });
        await visit.end();
    });

test('one tap is one click, and taps in a row are as many', async () => {
    for (const device of ['phone', 'desktop']) {
        const visit = await Visit.open(browser, device);
        const plus = await visit.control('field.target.depth.more');
        const depths = [at(await visit.plan(), 'target.depth')];
        for (let i = 0; i < 3; ++i) {
            await visit.tap(plus.id);
            depths.push(at(await visit.plan(), 'target.depth'));
        }
        const steps = depths.slice(1).map((depth, i) => Math.round((depth - depths[i]) * 1e6));
        assert.ok(steps[0] > 0 && steps.every((step) => step === steps[0]), `${device}: ${depths}`);
        await visit.end();
    }
});

test('two fingers neither zoom the page nor click nor drag', async () => {
    const visit = await Visit.open(browser, 'phone');
    const before = await visit.plan();
    const controls = await visit.controls();
    const { middle: { x, y } } = await visit.control('handle.target.depth');
    const fingers = await visit.fingers();
    await fingers.down([x, y]);
    await fingers.down([x, y], [x + 40, y]);
    for (let i = 1; i <= 8; ++i) await fingers.move([x - 6 * i, y], [x + 40 + 6 * i, y]);
    await fingers.up();
    await visit.settle();
    assert.equal(await visit.page.evaluate(() => visualViewport.scale), 1);
    assert.deepEqual(await visit.plan(), before);
    assert.deepEqual((await visit.controls()).map((c) => c.id), controls.map((c) => c.id), 'no sheet opened');
    // A press after the pinch works as ever.
    await visit.tap('view.lanes');
    assert.match((await visit.control('view.lanes')).value, /./);
    await visit.end();
});

for (const device of ['phone', 'desktop'])
    test(`ten idle seconds on a ${device} draw no frame`, async () => {
        const visit = await Visit.open(browser, device);
        await visit.drag('handle.target.depth', 0, 30);
        await visit.page.waitForTimeout(2500); // a hint fades, the plan is kept
        const frames = await visit.frames();
        await visit.page.waitForTimeout(10000);
        assert.equal((await visit.frames()) - frames, 0);
        await visit.end();
    });

test('a WebGL context that is lost comes back with its picture and without an error', async () => {
    const visit = await Visit.open(browser, 'desktop');
    const ink = await visit.inked();
    await visit.page.evaluate(async () => {
        const gl = document.getElementById('surface').getContext('webgl2');
        window.loss = gl.getExtension('WEBGL_lose_context');
        window.loss.loseContext();
        await new Promise((done) => setTimeout(done, 300));
    });
    await visit.page.mouse.move(700, 400); // frames while there is nothing to draw on
    await visit.settle();
    const lost = await visit.inked();
    await visit.page.evaluate(async () => {
        window.loss.restoreContext();
        await new Promise((done) => setTimeout(done, 300));
    });
    await visit.page.mouse.move(5, 400);
    await visit.settle();
    const back = await visit.inked();
    assert.ok(Math.abs(back - ink) < 0.02 * ink, `ink before ${ink}, while lost ${lost}, after ${back}`);
    assert.ok(lost < 0.5 * ink, 'it had been gone');
    assert.equal(await visit.page.evaluate(() => document.getElementById('surface').getContext('webgl2').getError()), 0);
    await visit.tap('view.pulse');
    assert.match((await visit.control('view.pulse')).value, /./);
    await visit.end();
});

test('the page is worked by keyboard alone: Tab, Enter, arrows', async () => {
    const visit = await Visit.open(browser, 'desktop');
    const reach = async (name) => {
        for (let i = 0; i < 80; ++i) {
            await visit.page.keyboard.press('Tab');
            if ((await visit.page.evaluate(() => document.activeElement.id)) === `control:${name}`) return;
        }
        assert.fail(`Tab never reached ${name}`);
    };
    await reach('view.pair');
    await visit.page.keyboard.press('Enter');
    await visit.settle();
    assert.match((await visit.control('view.pair')).value, /./);
    const before = at(await visit.plan(), 'target.gap');
    await reach('handle.target.gap');
    await visit.settle();
    await visit.page.keyboard.press('ArrowRight');
    await visit.settle();
    assert.ok(at(await visit.plan(), 'target.gap') > before);
    await visit.end();
});

test('the surface is as sharp as the screen, and follows a turn of the phone', async () => {
    const visit = await Visit.open(browser, 'phone');
    const size = () => visit.page.evaluate(() => [document.getElementById('surface').width, document.getElementById('surface').height]);
    assert.deepEqual(await size(), [1080, 1920]);
    await visit.page.setViewportSize({ width: 640, height: 360 });
    await visit.page.waitForFunction(() => document.getElementById('surface').width === 1920, null, { timeout: 5000 });
    await visit.settle();
    assert.deepEqual(await size(), [1920, 1080]);
    for (const control of await visit.controls())
        assert.ok(control.x >= -1 && control.x + control.width <= 641, `${control.id} lies inside`);
    assert.ok((await visit.inked()) > 0.05);
    await visit.end();
});

test('a plan is named through a text field of the page', async () => {
    const visit = await Visit.open(browser, 'phone');
    await visit.tap('plan.name');
    const field = visit.page.locator('#field');
    if (!(await field.isVisible())) await visit.tap((c) => /name/i.test(c.id) && c.id !== 'plan.name');
    assert.equal(await visit.page.evaluate(() => document.activeElement.id), 'field', 'focused inside the tap: the keyboard is up');
    await field.fill('North gate');
    await field.press('Backspace');
    await field.press('Enter');
    await visit.settle();
    assert.equal((await visit.plan()).name, 'North gat');
    assert.equal(await field.isVisible(), false);
    await visit.end();
});

// The same page in the other two engines, by their own drivers: opens, draws, takes a drag and a tap, computes in a worker, keeps
// the plan.
// Both need a display: xvfb-run gives one.
import assert from 'node:assert/strict';
import { spawn } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { createServer } from 'node:net';
import { after, before, test } from 'node:test';
import puppeteer from 'puppeteer-core';
import { serve } from '../../web/server.mjs';
import { built } from './page.mjs';

let server;
before(async () => {
    assert.ok(process.env.DISPLAY, 'no display: run this under xvfb-run');
    server = await serve(built);
});
after(() => server.close());

/// The steps, given how to run a function in the page and how to drag and press there.
async function smoke({ run, drag, reload }) {
    const until = async (what, ready) => {
        const end = Date.now() + 30000;
        for (;;) {
            const value = await run(what);
            if (ready(value)) return value;
            assert.ok(Date.now() < end, `still ${JSON.stringify(value)}`);
            await new Promise((done) => setTimeout(done, 100));
        }
    };
    const settled = () => until(`return window.groundgrain ? window.groundgrain.settled() : document.getElementById('loading').textContent`, (v) => v === true);
    const control = (id) => run(`return window.groundgrain.controls().find((c) => c.id === ${JSON.stringify(id)})`);
    const middle = ({ x, y, width, height }) => [Math.round(x + width / 2), Math.round(y + height / 2)];

    await settled();
    assert.ok((await run('return window.groundgrain.answers().answers.length')) > 15);
    assert.equal(await run(`return document.documentElement.classList.contains('as-text')`), false, 'WebGL 2 is there');
    const colours = await run(`
        const canvas = document.getElementById('surface');
        const gl = canvas.getContext('webgl2');
        dispatchEvent(new Event('resize'));
        return [canvas.width, canvas.height, gl.getError()]`);
    assert.ok(colours[0] > 300 && colours[1] > 300);
    assert.equal(colours[2], 0);

    const depth = 'return window.groundgrain.plan().target.depth';
    const before = await run(depth);
    const [x, y] = middle(await control('handle.target.depth'));
    await drag([x, y], [x, y + 40]);
    const dragged = await until(depth, (now) => JSON.stringify(now) !== JSON.stringify(before));
    await settled();
    const [px, py] = middle(await control('view.pair'));
    await drag([px, py], [px, py]);
    await until(`return window.groundgrain.controls().find((c) => c.id === 'picture').value`, (value) => / raw, /.test(value));
    assert.equal(await run('return window.groundgrain.reckoner().by'), 'worker');
    const [tx, ty] = middle(await control('view.lanes'));
    await drag([tx, ty], [tx, ty]);
    await until(`return window.groundgrain.controls().find((c) => c.id === 'view.lanes').value`, (value) => value !== '');
    await new Promise((done) => setTimeout(done, 1000));
    await reload();
    await settled();
    assert.deepEqual(await run(depth), dragged, 'kept over a reload');
    const frames = await run('return window.groundgrain.frames()');
    await new Promise((done) => setTimeout(done, 3000));
    assert.equal(await run('return window.groundgrain.frames()'), frames, 'idle');
}

test('Firefox opens the page, draws, drags, keeps the plan and idles', { timeout: 120000 }, async () => {
    const browser = await puppeteer.launch({
        browser: 'firefox', executablePath: '/usr/bin/firefox-esr', headless: false,
        extraPrefsFirefox: { 'webgl.force-enabled': true, 'app.update.enabled': false, 'datareporting.policy.dataSubmissionEnabled': false },
        env: { ...process.env, LIBGL_ALWAYS_SOFTWARE: '1' },
    });
    try {
        const page = await browser.newPage();
        const complaints = [];
        page.on('console', (message) => message.type() === 'error' && complaints.push(message.text()));
        page.on('pageerror', (error) => complaints.push(String(error)));
        await page.setViewport({ width: 1200, height: 800 });
        await page.goto(`http://localhost:${server.port}/`);
        await smoke({
            run: (body) => page.evaluate(`(() => { ${body} })()`),
            drag: async ([x, y], [u, v]) => {
                await page.mouse.move(x, y);
                await page.mouse.down();
                for (let i = 1; i <= 5; ++i) await page.mouse.move(x + ((u - x) * i) / 5, y + ((v - y) * i) / 5);
                await page.mouse.up();
            },
            reload: () => page.reload(),
        });
        assert.deepEqual(complaints, []);
    } finally {
        await browser.close();
    }
});

const freePort = () =>
    new Promise((resolve) => {
        const probe = createServer().listen(0, '127.0.0.1', () => {
            const { port } = probe.address();
            probe.close(() => resolve(port));
        });
    });

test('WebKit opens the page, draws, drags, keeps the plan and idles', { timeout: 120000 }, async () => {
    const libraries = '/usr/lib';
    const binary = readdirSync(libraries).flatMap((folder) => ['webkit2gtk-4.1', 'webkit2gtk-4.0'].map(
        (version) => `${libraries}/${folder}/${version}/MiniBrowser`)).find(existsSync);
    assert.ok(binary, 'WebKitGTK has its small browser');
    const port = await freePort();
    const driver = spawn('WebKitWebDriver', [`--port=${port}`], {
        stdio: 'ignore', env: { ...process.env, LIBGL_ALWAYS_SOFTWARE: '1', WEBKIT_DISABLE_SANDBOX_THIS_IS_DANGEROUS: '1' },
    });
    let session = '';
    const send = async (method, path, body) => {
        const answer = await fetch(`http://127.0.0.1:${port}${path}`, { method, body: body && JSON.stringify(body) });
        const { value } = await answer.json();
        assert.ok(answer.ok, `${method} ${path}: ${value?.message}`);
        return value;
    };
    try {
        for (let i = 0; i < 100; ++i) {
            const up = await send('GET', '/status').then(() => true, () => false);
            if (up) break;
            await new Promise((done) => setTimeout(done, 100));
        }
        const { sessionId } = await send('POST', '/session', {
            capabilities: { alwaysMatch: { 'webkitgtk:browserOptions': { binary, args: ['--automation'] } } },
        });
        session = `/session/${sessionId}`;
        await send('POST', `${session}/window/rect`, { width: 1200, height: 850 });
        await send('POST', `${session}/url`, { url: `http://localhost:${server.port}/` });
        await smoke({
            run: (script) => send('POST', `${session}/execute/sync`, { script, args: [] }),
            drag: ([x, y], [u, v]) => send('POST', `${session}/actions`, {
                actions: [{
                    type: 'pointer', id: 'mouse', parameters: { pointerType: 'mouse' },
                    actions: [
                        { type: 'pointerMove', x, y, duration: 0 }, { type: 'pointerDown', button: 0 },
                        { type: 'pause', duration: 80 },
                        { type: 'pointerMove', x: Math.round((x + u) / 2), y: Math.round((y + v) / 2), duration: 60 },
                        { type: 'pointerMove', x: u, y: v, duration: 60 }, { type: 'pause', duration: 80 },
                        { type: 'pointerUp', button: 0 },
                    ],
                }],
            }),
            reload: () => send('POST', `${session}/refresh`, {}),
        });
    } finally {
        if (session) await send('DELETE', session).catch(() => {});
        driver.kill();
    }
});

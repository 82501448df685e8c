// Drives the page by the names of its controls, never by where they happen to be drawn.
import assert from 'node:assert/strict';
import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium } from 'playwright-core';
import { serve } from '../../web/server.mjs';

const repository = join(dirname(fileURLToPath(import.meta.url)), '../..');
/// The built page: GG_PAGE, or where web/serve.sh and tests/run.sh build it.
export const built = process.env.GG_PAGE ?? join(repository, 'build/web/page');
assert.ok(existsSync(join(built, 'index.html')), `no page in ${built}: build it with  bash web/serve.sh --build-only`);

const chromiumFlags = [
    '--no-sandbox', '--use-gl=angle', '--use-angle=swiftshader', '--enable-unsafe-swiftshader', '--disable-background-networking',
    '--disable-component-update', '--disable-sync', '--no-first-run', '--disable-quic', '--disable-dev-shm-usage',
];
export const launch = () => chromium.launch({ executablePath: '/usr/bin/chromium', args: chromiumFlags });

export const devices = {
    phone: { viewport: { width: 360, height: 640 }, deviceScaleFactor: 3, hasTouch: true, isMobile: true },
    tablet: { viewport: { width: 820, height: 1180 }, deviceScaleFactor: 2, hasTouch: true, isMobile: true },
    desktop: { viewport: { width: 1440, height: 900 }, deviceScaleFactor: 1 },
};

export class Visit {
    /// A visit by a new person. `folder` may be a function, so that what is served can change under way.
    static async begin(browser, device = 'desktop', { folder = built, address, ...options } = {}) {
        const visit = new Visit();
        visit.touch = Boolean(devices[device].hasTouch);
        visit.server = address ? null : await serve(folder);
        visit.server?.unref(); // a test that fails leaves it open
        visit.address = address ?? `http://localhost:${visit.server.port}/`;
        visit.context = await browser.newContext({ ...devices[device], ...options });
        visit.complaints = [];
        visit.foreign = [];
        visit.page = await visit.context.newPage();
        visit.page.on('console', (message) => {
            if (['error', 'warning'].includes(message.type())) visit.complaints.push(message.text());
        });
        visit.page.on('pageerror', (error) => visit.complaints.push(String(error)));
        visit.context.on('request', (request) => {
            if (!request.url().startsWith(visit.address) && !/^(data|blob):/.test(request.url())) visit.foreign.push(request.url());
        });
        return visit;
    }
    static async open(browser, device, options) {
        const visit = await Visit.begin(browser, device, options);
        await visit.go();
        return visit;
    }
    async go(path = '') {
        await this.page.goto(this.address + path);
        await this.ready();
    }
    async ready() {
        await this.page.waitForSelector('html[data-ready]', { state: 'attached', timeout: 30000 });
        await this.settle();
    }
    /// Until no frame is asked for any more, nothing is computed beside the page, and the mirror has caught up.
    async settle() {
        await this.page.waitForFunction(() => window.groundgrain.settled(), null, { polling: 20, timeout: 60000 });
        await this.page.waitForTimeout(160);
    }
    controls() {
        return this.page.evaluate(() => window.groundgrain.controls());
    }
    plan() {
        return this.page.evaluate(() => window.groundgrain.plan());
    }
    answers() {
        return this.page.evaluate(() => window.groundgrain.answers());
    }
    frames() {
        return this.page.evaluate(() => window.groundgrain.frames());
    }
    async answer(key) {
        const found = (await this.answers()).answers.find((answer) => answer.key === key);
        assert.ok(found, `no answer ${key}`);
        return found;
    }
    /// A control by id, by name, or by a test on it.
    async find(which) {
        const controls = await this.controls();
        const fits = typeof which === 'function' ? which
            : which instanceof RegExp ? (c) => which.test(c.id) || which.test(c.name) : (c) => c.id === which || c.name === which;
        return controls.find(fits);
    }
    async control(which) {
        const found = await this.find(which);
        assert.ok(found, `no control ${which} among ${(await this.controls()).map((c) => `${c.id} (${c.name})`).join(', ')}`);
        return { ...found, middle: { x: found.x + found.width / 2, y: found.y + found.height / 2 } };
    }
    /// One tap or click, by the device's own kind of pointer, through the browser.
    async tap(which) {
        const { x, y } = (await this.control(which)).middle;
        if (this.touch) await this.page.touchscreen.tap(x, y);
        else await this.page.mouse.click(x, y);
        await this.settle();
    }
    async fingers() {
        this.session ??= await this.context.newCDPSession(this.page);
        const send = (type, points) =>
            this.session.send('Input.dispatchTouchEvent', { type, touchPoints: points.map(([x, y], id) => ({ x, y, id })) });
        return { down: (...p) => send('touchStart', p), move: (...p) => send('touchMove', p), up: () => send('touchEnd', []) };
    }
    /// Drags a control by so many css pixels, in steps like a hand's.
    async drag(which, dx, dy) {
        const { x, y } = (await this.control(which)).middle;
        const steps = 8;
        const at = (i) => [x + (dx * i) / steps, y + (dy * i) / steps];
        if (this.touch) {
            const fingers = await this.fingers();
            await fingers.down([x, y]);
            for (let i = 1; i <= steps; ++i) await fingers.move(at(i)), await this.page.waitForTimeout(16);
            await fingers.up();
        } else {
            await this.page.mouse.move(x, y);
            await this.page.mouse.down();
            for (let i = 1; i <= steps; ++i) await this.page.mouse.move(...at(i)), await this.page.waitForTimeout(16);
            await this.page.mouse.up();
        }
        await this.settle();
    }
    /// Runs `measure(pixels)` on what is to be seen: RGBA bytes, row by row.
    async look(measure) {
        const shot = await this.page.screenshot();
        // Decoded by hand: the page's policy lets it fetch nothing, and that is as it should be.
        return this.page.evaluate(`(async (base64) => {
            const bytes = Uint8Array.from(atob(base64), (c) => c.charCodeAt(0));
            const image = await createImageBitmap(new Blob([bytes], { type: 'image/png' }));
            const context = new OffscreenCanvas(image.width, image.height).getContext('2d');
            context.drawImage(image, 0, 0);
            return (${measure})(context.getImageData(0, 0, image.width, image.height).data);
        })('${shot.toString('base64')}')`);
    }
    /// Share of the pixels that differ from the corner's: 0 is a blank picture.
    inked() {
        return this.look((data) => {
            let other = 0;
            for (let i = 0; i < data.length; i += 4) other += data[i] !== data[0] || data[i + 1] !== data[1] || data[i + 2] !== data[2];
            return other / (data.length / 4);
        });
    }
    /// Mean of the green channel, 0 to 255.
    brightness() {
        return this.look((data) => {
            let sum = 0;
            for (let i = 1; i < data.length; i += 4) sum += data[i];
            return sum / (data.length / 4);
        });
    }
    async end() {
        await this.context.close();
        await this.server?.close();
    }
}

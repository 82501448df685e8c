// What a person meets who opens the page: first visit, next visit, dark, without WebGL, from disk.
import assert from 'node:assert/strict';
import { cpSync, mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, test } from 'node:test';
import { Visit, built, launch } from './page.mjs';

let browser;
before(async () => (browser = await launch()));
after(() => browser.close());

const quiet = (visit) => {
    assert.deepEqual(visit.complaints, [], 'nothing on the console');
    assert.deepEqual(visit.foreign, [], 'no request to anywhere else');
};

for (const device of ['phone', 'tablet', 'desktop'])
    test(`a first visit on a ${device} shows a demo plan alive, and complains of nothing`, async () => {
        const visit = await Visit.open(browser, device);
        const { answers, plan, caution } = await visit.answers();
        assert.ok(answers.length > 15, `${answers.length} answers`);
        assert.ok(plan.length > 0);
        assert.match(caution, /cannot prove/);
        assert.ok((await visit.inked()) > 0.05, 'the surface is not blank');
        for (const view of ['beam', 'pulse', 'pair', 'lanes']) await visit.control(`view.${view}`);
        const { width, scroll } = await visit.page.evaluate(() => ({
            width: innerWidth, scroll: document.documentElement.scrollWidth,
        }));
        assert.ok(scroll <= width, 'no sideways scroll');
        quiet(visit);
        await visit.end();
    });

test('the answers stand in the page for a screen reader, and follow the plan', async () => {
    const visit = await Visit.open(browser, 'desktop');
    const region = visit.page.getByRole('region', { name: 'Answers' });
    const { answers, plan } = await visit.answers();
    assert.equal(await region.locator('tbody tr').count(), answers.length);
    const row = region.locator('tr[data-key="apart.sideways"]');
    const said = await row.innerText();
    assert.ok(said.includes(answers.find((a) => a.key === 'apart.sideways').name));
    assert.match(said, /\d/);
    assert.ok((await visit.page.locator('h1').innerText()).includes(plan));
    await visit.drag('handle.target.depth', 0, 60);
    await visit.page.waitForFunction(
        (before) => document.querySelector('tr[data-key="apart.sideways"]').innerText !== before, said, { timeout: 5000 });
    // The live region says one sentence once things have settled.
    await visit.page.waitForFunction(() => document.getElementById('status').textContent.length > 10, null, { timeout: 5000 });
    await visit.end();
});

test('the second visit works with the network off, by any query or fragment', async () => {
    const visit = await Visit.open(browser, 'phone');
    await visit.page.evaluate(() => navigator.serviceWorker.ready);
    await visit.page.waitForFunction(() => navigator.serviceWorker.controller !== null);
    const plan = await visit.plan();
    await visit.server.close();
    visit.server = null;
    await visit.context.setOffline(true);
    await visit.go('?from=home#view');
    assert.deepEqual(await visit.plan(), plan);
    assert.ok((await visit.inked()) > 0.05);
    quiet(visit);
    await visit.end();
});

test('an update waits until the person takes it, and the plan comes along', async () => {
    const next = mkdtempSync(join(tmpdir(), 'page-'));
    cpSync(built, next, { recursive: true });
    // The same page in its next version: another worker with another name for its cache.
    const worker = readFileSync(join(built, 'sw.js'), 'utf8');
    assert.match(worker, /groundgrain-/);
    for (const file of readdirSync(next)) if (/^sw\.js\./.test(file)) rmSync(join(next, file));
    const changed = worker.replace(/"([0-9a-f]{10})"/, '"0123456789"');
    assert.notEqual(changed, worker);
    writeFileSync(join(next, 'sw.js'), changed);

    let folder = built;
    const visit = await Visit.open(browser, 'desktop', { folder: () => folder });
    await visit.page.waitForFunction(() => navigator.serviceWorker.controller !== null);
    const caches = () => visit.page.evaluate(() => caches.keys());
    const before = await caches();
    await visit.drag('handle.target.depth', 0, 40);
    const plan = await visit.plan();
    folder = next;
    await visit.page.evaluate(async () => (await navigator.serviceWorker.ready).update());
    const banner = visit.page.getByRole('alertdialog', { name: 'Update' });
    await banner.waitFor({ timeout: 10000 });
    assert.equal((await caches()).includes(before[0]), true, 'the old version still serves');
    await Promise.all([visit.page.waitForEvent('load'), visit.page.getByRole('button', { name: 'Use it now' }).click()]);
    await visit.ready();
    assert.deepEqual(await caches(), ['groundgrain-0123456789']);
    assert.deepEqual(await visit.plan(), plan);
    assert.equal(await banner.isVisible(), false);
    await visit.end();
    rmSync(next, { recursive: true });
});

test('the plan survives a reload, and a tab that is killed', async () => {
    const visit = await Visit.open(browser, 'desktop');
    await visit.drag('handle.target.depth', 0, 50);
    const plan = await visit.plan();
    await visit.page.reload();
    await visit.ready();
    assert.deepEqual(await visit.plan(), plan);

    await visit.drag('handle.target.depth', 0, -30);
    const later = await visit.plan();
    assert.notDeepEqual(later, plan);
    await visit.page.waitForTimeout(1000); // a kill gives no notice: what was autosaved has to do
    const session = await visit.context.newCDPSession(visit.page);
    session.send('Page.crash').catch(() => {});
    await visit.page.waitForEvent('crash');
    await visit.page.close();
    visit.page = await visit.context.newPage();
    await visit.go();
    assert.deepEqual(await visit.plan(), later);
    await visit.end();
});

test('the system asking for dark gives a dark picture, and light a light one', async () => {
    const brightness = async (colorScheme) => {
        const visit = await Visit.open(browser, 'phone', { colorScheme });
        const mean = await visit.brightness();
        quiet(visit);
        // Follows the system while the page is open, too.
        const frames = await visit.frames();
        await visit.page.emulateMedia({ colorScheme: colorScheme === 'dark' ? 'light' : 'dark' });
        await visit.settle();
        assert.ok((await visit.frames()) > frames, 'drawn anew when the system changes');
        await visit.end();
        return mean;
    };
    const [dark, light] = [await brightness('dark'), await brightness('light')];
    assert.ok(dark < 90 && light > 165, `mean brightness ${dark} and ${light} of 255`);
});

test('without WebGL 2 the page says so and works as text', async () => {
    const visit = await Visit.begin(browser, 'desktop');
    await visit.page.addInitScript(() => {
        const original = HTMLCanvasElement.prototype.getContext;
        HTMLCanvasElement.prototype.getContext = function (kind, ...rest) {
            return /webgl/.test(kind) ? null : original.call(this, kind, ...rest);
        };
    });
    await visit.go();
    assert.match(await visit.page.locator('#why-text').innerText(), /WebGL 2/);
    assert.equal(await visit.page.getByRole('region', { name: 'Answers' }).isVisible(), true);
    const pressed = (view) => visit.page.getByRole('button', { name: view, exact: true }).getAttribute('aria-pressed');
    assert.equal(await pressed('Beam'), 'true');
    await visit.page.getByRole('button', { name: 'Lanes', exact: true }).click();
    await visit.settle();
    assert.equal(await pressed('Lanes'), 'true');
    await visit.end();
});

test('the single file opens from disk under its own strict policy', async () => {
    const visit = await Visit.begin(browser, 'desktop', { address: `file://${built}/` });
    await visit.go('groundgrain.html');
    assert.ok((await visit.answers()).answers.length > 15);
    assert.ok((await visit.inked()) > 0.05);
    await visit.drag('handle.target.depth', 0, 40);
    const plan = await visit.plan();
    await visit.page.reload();
    await visit.ready();
    assert.deepEqual(await visit.plan(), plan);
    quiet(visit);
    await visit.end();
});

test('the policy lets no other script run and nothing leave', async () => {
    const visit = await Visit.open(browser, 'desktop');
    const refused = await visit.page.evaluate(async () => {
        const violations = [];
        document.addEventListener('securitypolicyviolation', (event) => violations.push(event.effectiveDirective));
        await fetch('http://127.0.0.2:9/').catch(() => {});
        const script = document.createElement('script');
        script.textContent = 'window.intruded = true';
        document.body.append(script);
        await new Promise((done) => setTimeout(done, 100));
        return { violations, intruded: window.intruded ?? false };
    });
    assert.deepEqual(refused, { violations: ['connect-src', 'script-src-elem'], intruded: false });
    await visit.end();
});

test('the page can be installed', async () => {
    const visit = await Visit.open(browser, 'phone');
    await visit.page.evaluate(() => navigator.serviceWorker.ready);
    const session = await visit.context.newCDPSession(visit.page);
    const { installabilityErrors } = await session.send('Page.getInstallabilityErrors');
    assert.deepEqual(installabilityErrors.map((error) => error.errorId).filter((id) => id !== 'in-incognito'), []);
    await visit.end();
});

// The page around the program: it draws a frame when something happened, and sleeps otherwise.
import { compile, runProgram } from './bridge.js';
import { makeField } from './field.js';
import { copyText, makeOpener, saveFile } from './files.js';
import { keep, recall } from './keep.js';
import { listenToKeys } from './keys.js';
import { makeMirror } from './mirror.js';
import { listenToPointers } from './pointer.js';
import { makeReckoner, reckonForPage } from './reckon.js';
import { watchSurface } from './surface.js';
import { offerUpdates } from './update.js';

const mirrorPause = 120; // ms after the last frame: a drag draws many frames and needs one mirror

/// Where this script is to be had again, for a worker: its own address, or its text where it is part of the page.
function findScript() {
    const { src, textContent } = document.currentScript;
    return src ? () => src : () => URL.createObjectURL(new Blob([textContent], { type: 'text/javascript' }));
}

async function start(script) {
    const wasm = await compile();
    const program = await runProgram(wasm);
    const surface = document.getElementById('surface');
    const storage = openStorage();
    let drawn = 0;
    let asked = 0;
    let sleeping = 0;
    let mirrorTimer = 0;
    let settled = true;

    const shown = program.start() === 1;
    if (!shown) showAsText('This browser offers no WebGL 2, so the pictures cannot be drawn. Everything else works here as text.');
    for (const name of ['preferences', 'plan']) {
        const text = storage && recall(storage, name);
        if (text) program.restore(name, text);
    }

    const kick = () => {
        settled = false;
        asked ||= requestAnimationFrame(frame); // a hidden page draws when it is seen again
    };
    const mirror = makeMirror(program, kick);
    const edit = makeField(program, kick);
    const openFile = makeOpener(program, kick);
    const reckoner = makeReckoner(program, wasm, script, (bytes) => {
        program.reckoned(bytes);
        kick();
    });

    function serve() {
        const text = program.requests();
        if (!text) return false;
        for (const request of JSON.parse(text)) {
            if (request.kind === 'store') storage && keep(storage, request.name, request.text);
            if (request.kind === 'save_file') saveFile(request.name, request.text);
            if (request.kind === 'open_file') openFile();
            if (request.kind === 'edit_text') edit(request);
            if (request.kind === 'copy') copyText(request.text);
            if (request.kind === 'announce') mirror.announce(request.text);
            if (request.kind === 'reckon') reckoner.order(request.text);
        }
        return true;
    }
    function afterFrame(wake) {
        serve();
        clearTimeout(sleeping);
        if (wake === 0) kick();
        else if (wake > 0) sleeping = setTimeout(kick, wake * 1000);
        settled = wake !== 0;
        clearTimeout(mirrorTimer);
        mirrorTimer = setTimeout(mirror.sync, mirrorPause);
    }
    function frame(now) {
        asked = 0;
        ++drawn;
        afterFrame(program.frame(now / 1000, 1));
    }
    /// What a let-go press asks for (a keyboard, a file, the clipboard) browsers grant only inside its own event: work the
    /// waiting input off here, without drawing.
    function workOff() {
        for (let i = 0; i < 4; ++i) {
            const wake = program.frame(performance.now() / 1000, 0);
            if (serve() || wake !== 0) break;
        }
    }
    function keepAll() {
        if (storage) keep(storage, 'plan', program.plan());
    }

    const watched = watchSurface(surface, program, () => frame(performance.now()));
    listenToPointers(surface, program, (touch, ended) => {
        watched.touched(touch);
        if (ended) workOff();
        kick();
    });
    listenToKeys(program, kick);
    surface.addEventListener('webglcontextlost', (event) => {
        event.preventDefault(); // else it never comes back
        program.context_lost();
    });
    surface.addEventListener('webglcontextrestored', () => {
        program.context_restored();
        kick();
    });
    document.addEventListener('visibilitychange', () => (document.visibilityState === 'hidden' ? keepAll() : kick()));
    addEventListener('pagehide', keepAll);
    document.getElementById('text-view').addEventListener('click', toggleText);

    frame(performance.now());
    mirror.sync();
    document.getElementById('loading').hidden = true;
    document.documentElement.dataset.ready = 'true';
    performance.mark('answers');
    offerUpdates(keepAll);

    /// For tests and bug reports; reads only.
    window.groundgrain = Object.freeze({
        controls: () => JSON.parse(program.controls()),
        answers: () => JSON.parse(program.answers()),
        plan: () => JSON.parse(program.plan()),
        frames: () => drawn,
        settled: () => settled && !asked && !reckoner.state().waiting,
        reckoner: reckoner.state,
    });
}

function openStorage() {
    try {
        return window.localStorage;
    } catch {
        return null; // forbidden by the person's settings: the plan lives as long as the page
    }
}

function showAsText(why) {
    document.getElementById('why-text').textContent = why;
    document.documentElement.classList.add('as-text');
}
function toggleText() {
    const on = document.documentElement.classList.toggle('as-text');
    document.getElementById('text-view').setAttribute('aria-pressed', String(on));
}

function apologise(reason) {
    const loading = document.getElementById('loading');
    loading.hidden = false;
    loading.textContent = `Groundgrain could not start in this browser. ${reason.message ?? reason}`;
}

if (typeof document === 'undefined') reckonForPage();
else start(findScript()).catch(apologise);

// Pair's section takes too long for a frame, so a worker computes it: it runs this same script and the same compiled program.
import { runProgram } from './bridge.js';

const patience = 1000; // ms: an order that nobody wants any more may end in that time, else its worker is ended

/// The page's side. The worker starts with the first order; where none can be had, the page computes after the frame.
/// @param address() of this script   @param heard(bytes) takes an answer, empty where there is none
/// @returns { order(text), state(): for tests }
export function makeReckoner(program, wasm, address, heard) {
    let worker = null;
    let ready = false;
    let refused = false; // no worker is to be had in this browser
    let waiting = null; // { text, since }: the order that is out
    let answers = 0;

    const answer = (bytes) => {
        waiting = null;
        ++answers;
        heard(bytes);
    };
    function onPage() {
        const mine = waiting;
        setTimeout(() => mine === waiting && answer(program.reckon(mine.text)));
    }
    function end() {
        worker?.terminate();
        worker = null;
        ready = false;
    }
    function start() {
        const mine = new Worker(address());
        mine.onmessage = ({ data }) => {
            if (mine !== worker) return;
            if (data === 'ready') ready = true;
            else if (waiting && data.text === waiting.text) answer(data.bytes);
        };
        mine.onerror = mine.onmessageerror = (event) => {
            event.preventDefault?.();
            if (mine !== worker) return;
            refused = !ready;
            end();
            if (!waiting) return;
            if (refused) onPage();
            else answer(new Uint8Array()); // it broke over this order: not again on the page
        };
        mine.postMessage({ wasm });
        return mine;
    }
    return {
        order(text) {
            if (waiting && performance.now() - waiting.since > patience) end();
            waiting = { text, since: performance.now() };
            try {
                if (!refused) worker ??= start();
            } catch {
                refused = true;
            }
            if (worker) worker.postMessage({ text });
            else onPage();
        },
        state: () => ({ by: worker ? 'worker' : refused ? 'page' : null, waiting: waiting !== null, answers }),
    };
}

/// The worker's side.
export function reckonForPage() {
    let program = null;
    const act = async ({ wasm, text }) => {
        program ??= runProgram(wasm);
        const { reckon } = await program;
        if (wasm) return self.postMessage('ready');
        const bytes = reckon(text);
        self.postMessage({ text, bytes }, [bytes.buffer]);
    };
    const fail = (reason) =>
        setTimeout(() => {
            throw reason; // out of the promise: only then the page hears of it
        });
    self.onmessage = ({ data }) => act(data).catch(fail);
}

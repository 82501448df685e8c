// The WebAssembly program and how texts cross to it: UTF-8 bytes and a length in, a pointer and gg_length() out.
import createProgram from 'program';

const encoder = new TextEncoder();
const decoder = new TextDecoder();

/// The bytes of the program: inside the self-contained page as compressed text, else a file beside the page.
async function compiled() {
    const inside = document.getElementById('program-bytes');
    if (inside) {
        const packed = Uint8Array.from(atob(inside.textContent), (c) => c.charCodeAt(0));
        const bytes = new Blob([packed]).stream().pipeThrough(new DecompressionStream('gzip'));
        return WebAssembly.compile(await new Response(bytes).arrayBuffer());
    }
    const file = fetch(document.getElementById('program').href, { credentials: 'same-origin' });
    // A server that does not know the type of the file makes streaming fail; the bytes are good all the same.
    return WebAssembly.compileStreaming(file).catch(async () => {
        const again = await fetch(document.getElementById('program').href, { credentials: 'same-origin' });
        return WebAssembly.compile(await again.arrayBuffer());
    });
}

/// @returns the program's functions by their names without `gg_`; JavaScript texts may be given and are returned as such.
export async function loadProgram() {
    const wasm = await compiled();
    const module = await createProgram({
        instantiateWasm(imports, receive) {
            WebAssembly.instantiate(wasm, imports).then((instance) => receive(instance, wasm));
            return {};
        },
    });
    const read = (pointer) => decoder.decode(module.HEAPU8.subarray(pointer, pointer + module._gg_length()));
    const program = {};
    for (const key of Object.keys(module)) {
        if (!key.startsWith('_gg_')) continue;
        program[key.slice(4)] = (...values) => {
            const borrowed = [];
            const plain = values.flatMap((value) => {
                if (typeof value !== 'string') return [value];
                const bytes = encoder.encode(value);
                const pointer = module._malloc(bytes.length + 1);
                module.HEAPU8.set(bytes, pointer); // HEAPU8 is read anew each time: it moves when memory grows
                borrowed.push(pointer);
                return [pointer, bytes.length];
            });
            const result = module[key](...plain);
            borrowed.forEach(module._free);
            return result;
        };
    }
    for (const name of ['requests', 'controls', 'answers', 'plan']) {
        const call = program[name];
        program[name] = () => read(call());
    }
    return program;
}

// The WebAssembly program and how texts and bytes cross to it: a pointer and a length in, a pointer and gg_length() out.
import createProgram from 'program';

const encoder = new TextEncoder();
const decoder = new TextDecoder();

// The smallest module with an instruction on vectors, which the program uses.
const vectors = [0, 97, 115, 109, 1, 0, 0, 0, 1, 5, 1, 96, 0, 1, 123, 3, 2, 1, 0, 10, 10, 1, 8, 0, 65, 0, 253, 15, 253, 98, 11];

/// The program, inside the self-contained page as compressed text, else a file beside the page.
export async function compile() {
    const inside = document.getElementById('program-bytes');
    if (!self.WebAssembly?.validate(new Uint8Array(vectors)) || (inside && !self.DecompressionStream))
        throw new Error('It needs a newer one: Chrome or Edge from 91 on, Firefox from 113, Safari from 16.4.');
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

/// @returns the program's functions by their names without `gg_`; JavaScript texts and bytes may be given, texts are
/// returned as such, and so are the bytes of an answer
export async function runProgram(wasm) {
    const module = await createProgram({
        instantiateWasm(imports, receive) {
            WebAssembly.instantiate(wasm, imports).then((instance) => receive(instance, wasm));
            return {};
        },
    });
    const bytesAt = (pointer) => module.HEAPU8.slice(pointer, pointer + module._gg_length());
    const program = {};
    for (const key of Object.keys(module)) {
        if (!key.startsWith('_gg_')) continue;
        program[key.slice(4)] = (...values) => {
            const borrowed = [];
            const plain = values.flatMap((value) => {
                if (typeof value === 'number') return [value];
                const bytes = typeof value === 'string' ? encoder.encode(value) : value;
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
        program[name] = () => decoder.decode(bytesAt(call()));
    }
    const { reckon } = program;
    program.reckon = (order) => bytesAt(reckon(order));
    return program;
}

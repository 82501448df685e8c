// Makes the page from what the compiler made: node web/build.mjs --program BUILD --out FOLDER [--imgui FOLDER]
// FOLDER gets index.html, files named by their own hash, the worker that keeps them, and groundgrain.html: all in one file.
import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { brotliCompressSync, constants, gzipSync } from 'node:zlib';

const web = dirname(fileURLToPath(import.meta.url));
const option = (name) => {
    const at = process.argv.indexOf(`--${name}`);
    return at > 0 ? process.argv[at + 1] : undefined;
};
const built = option('program');
const out = option('out');
if (!built || !out) {
    console.error('usage: node web/build.mjs --program BUILD --out FOLDER [--imgui FOLDER]');
    process.exit(2);
}

const hex = (bytes) => createHash('sha256').update(bytes).digest('hex').slice(0, 10);
const integrity = (bytes) => `'sha256-${createHash('sha256').update(bytes).digest('base64')}'`;
const source = (name) => readFileSync(join(web, name), 'utf8');
const esbuild = (...args) => execFileSync('esbuild', [...args, '--log-level=warning', '--charset=utf8'], { encoding: 'utf8' });

// ---- the parts ----

const browsers = '--target=chrome91,firefox113,safari16.4';
const script = esbuild(join(web, 'shell/main.js'), '--bundle', '--minify', '--format=iife', browsers,
    `--alias:program=${join(built, 'groundgrain.js')}`);
const style = esbuild(join(web, 'style.css'), '--minify');
const wasm = readFileSync(join(built, 'groundgrain.wasm'));
const iconSource = readFileSync(join(web, '../assets/icon.svg'), 'utf8');

/// The icon on a ground of its own: `share` of the side for the drawing, the rest is margin (launchers cut icons to shapes).
function iconPng(size, share, ground) {
    const side = size * share;
    const margin = (size - side) / 2;
    const drawing = iconSource.replace(/^[\s\S]*?<svg/, '<svg').replace(/<svg([^>]*)>/, (_, attributes) => {
        const kept = attributes.replace(/\s(width|height|x|y)="[^"]*"/g, '');
        return `<svg${kept} x="${margin}" y="${margin}" width="${side}" height="${side}">`;
    });
    const back = ground ? `<rect width="${size}" height="${size}" fill="${ground}"/>` : '';
    const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${size}" height="${size}">${back}${drawing}</svg>`;
    return execFileSync('rsvg-convert', ['--format=png'], { input: svg });
}

/// What has to travel with the third-party parts that are inside. Of a package that holds much more than what is used here,
/// the paragraphs that match.
function licences() {
    const documents = '/usr/share/doc';
    const parts = [
        ['Dear ImGui (controls)', option('imgui') && join(option('imgui'), 'LICENSE.txt')],
        ['DejaVu Sans (typeface, cut to the signs used)', `${documents}/fonts-dejavu-core/copyright`],
        ['JSON for Modern C++', `${documents}/nlohmann-json3-dev/copyright`],
        ['Eigen (transforms)', `${documents}/libeigen3-dev/copyright`, /^(Files: \*|License: MPL-2)/],
        ['Emscripten, musl and the LLVM run time (inside the program)', `${documents}/emscripten/copyright`,
            /^(Files:\s+\*\n|License: (Expat|NCSA~Mozilla)\n)|lib\/(libc\/musl|libcxx|compiler-rt)\//],
    ];
    return parts.filter(([, file]) => file && existsSync(file)).map(([name, file, wanted]) => {
        const paragraphs = readFileSync(file, 'utf8').trim().split(/\n\s*\n/).filter((text) => !wanted || wanted.test(text));
        return `==== ${name} ====\n\n${paragraphs.join('\n\n')}\n`;
    }).join('\n\n');
}

const policy = (scripts, styles, workers) =>
    [`default-src 'none'`, `script-src ${scripts} 'wasm-unsafe-eval'`, `style-src ${styles}`, `img-src 'self' data: blob:`,
        `connect-src 'self'`, `worker-src ${workers}`, `manifest-src 'self'`, `base-uri 'none'`, `form-action 'none'`].join('; ');
// Functions as replacements: the texts hold dollar signs.
const page = (parts) => source('index.html').replace(/\{\{(\w+)\}\}/g, (_, name) => parts[name]);

// ---- the folder ----

rmSync(out, { recursive: true, force: true });
mkdirSync(out, { recursive: true });
const files = new Map();
function add(stem, ending, bytes, hashed = true) {
    const name = hashed ? `${stem}-${hex(bytes)}.${ending}` : `${stem}.${ending}`;
    files.set(name, Buffer.from(bytes));
    return name;
}

const names = {
    wasm: add('groundgrain', 'wasm', wasm),
    script: add('shell', 'js', script),
    style: add('style', 'css', style),
    icon: add('icon', 'svg', iconSource),
    touch: add('icon-180', 'png', iconPng(180, 0.86, '#ffffff')),
    small: add('icon-192', 'png', iconPng(192, 1)),
    large: add('icon-512', 'png', iconPng(512, 1)),
    mask: add('icon-mask', 'png', iconPng(512, 0.72, '#ffffff')),
};
add('licences', 'txt', licences(), false);
const manifest = add('manifest', 'webmanifest', JSON.stringify({
    id: './', name: 'Groundgrain', short_name: 'Groundgrain', lang: 'en', start_url: './', scope: './', display: 'standalone',
    description: 'Plan a ground-penetrating-radar survey by how fine a picture of the ground it will give.',
    background_color: '#ffffff', theme_color: '#ffffff', categories: ['utilities', 'productivity'],
    icons: [
        { src: names.icon, sizes: 'any', type: 'image/svg+xml' },
        { src: names.small, sizes: '192x192', type: 'image/png' },
        { src: names.large, sizes: '512x512', type: 'image/png' },
        { src: names.mask, sizes: '512x512', type: 'image/png', purpose: 'maskable' },
    ],
}));
files.set('index.html', Buffer.from(page({
    policy: policy(`'self'`, `'self'`, `'self'`),
    head: `<link rel="preload" id="program" href="${names.wasm}" as="fetch" type="application/wasm" crossorigin>
<link rel="stylesheet" href="${names.style}">
<link rel="icon" href="${names.icon}" type="image/svg+xml">
<link rel="apple-touch-icon" href="${names.touch}">
<link rel="manifest" href="${manifest}">
<script src="${names.script}" defer></script>`,
    scripts: '',
})));
const version = hex(Buffer.concat([...files].flatMap(([name, bytes]) => [Buffer.from(name), bytes])));
const list = ['./', ...[...files.keys()].filter((name) => name !== 'index.html')];
files.set('sw.js', Buffer.from(esbuild(join(web, 'sw.js'), '--minify-whitespace', `--define:VERSION=${JSON.stringify(version)}`,
    `--define:FILES=${JSON.stringify(list)}`)));

// ---- the same in one file, which opens from disk ----

// A text inside a script element ends at the first "</script".
const inline = script.replace(/<\/script/gi, '<\\/script');
const packed = gzipSync(wasm, { level: 9 }).toString('base64');
const single = page({
    policy: policy(integrity(inline), integrity(style), 'blob:'),
    head: `<style>${style}</style>\n<link rel="icon" href="data:image/svg+xml;base64,${Buffer.from(iconSource).toString('base64')}">`,
    scripts: `<script type="text/plain" id="program-bytes">${packed}</script>\n`
        + `<script type="text/plain" id="licences">${licences().replace(/<\/script/gi, '')}</script>\n<script>${inline}</script>`,
});

for (const [name, bytes] of files) {
    writeFileSync(join(out, name), bytes);
    if (name.endsWith('.png')) continue; // compressed already
    writeFileSync(join(out, `${name}.gz`), gzipSync(bytes, { level: 9 }));
    const quality = { params: { [constants.BROTLI_PARAM_QUALITY]: 11, [constants.BROTLI_PARAM_SIZE_HINT]: bytes.length } };
    writeFileSync(join(out, `${name}.br`), brotliCompressSync(bytes, quality));
}
writeFileSync(join(out, 'groundgrain.html'), single);
console.log(`page ${version}: ${files.size} files, ${list.length} kept for use without a network; groundgrain.html ${(single.length / 1024).toFixed(0)} kB`);

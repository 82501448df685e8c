// A small static server for the built page: right types, strict headers, compressed copies where they are there.
// node web/server.mjs FOLDER [PORT] [ADDRESS]; or serve() from a test.
import { createReadStream, existsSync, statSync } from 'node:fs';
import { createServer } from 'node:http';
import { extname, join, normalize } from 'node:path';
import { fileURLToPath } from 'node:url';

const types = {
    '.html': 'text/html; charset=utf-8', '.js': 'text/javascript; charset=utf-8', '.css': 'text/css; charset=utf-8',
    '.wasm': 'application/wasm', '.svg': 'image/svg+xml', '.png': 'image/png', '.txt': 'text/plain; charset=utf-8',
    '.webmanifest': 'application/manifest+json',
};
const strict = {
    'X-Content-Type-Options': 'nosniff',
    'Referrer-Policy': 'no-referrer',
    'Cross-Origin-Opener-Policy': 'same-origin',
    'Cross-Origin-Resource-Policy': 'same-origin',
    'Permissions-Policy': 'camera=(), microphone=(), geolocation=()',
    // The page's own policy stands in the page; a frame around it can be forbidden by header alone.
    'Content-Security-Policy': `frame-ancestors 'none'`,
};

/// @param folder  () => path, or a path
/// @returns { port, requests: paths asked for, close() } once it listens
export function serve(folder, port = 0, address = '127.0.0.1') {
    const root = typeof folder === 'function' ? folder : () => folder;
    const requests = [];
    const server = createServer((request, response) => {
        const end = (status) => response.writeHead(status, strict).end();
        let path;
        try {
            path = decodeURIComponent(new URL(request.url, 'http://page').pathname);
        } catch {
            return end(400);
        }
        requests.push(path);
        if (request.method !== 'GET' && request.method !== 'HEAD') return end(405);
        if (path.endsWith('/')) path += 'index.html';
        const file = join(root(), normalize(path)); // normalize() of an absolute path cannot climb above its root
        if (path.includes('\0') || !existsSync(file) || !statSync(file).isFile()) return end(404);
        const headers = {
            ...strict,
            'Content-Type': types[extname(file)] ?? 'application/octet-stream',
            'Cache-Control': /-[0-9a-f]{10}\./.test(file) ? 'public, max-age=31536000, immutable' : 'no-cache',
            Vary: 'Accept-Encoding',
        };
        const accepted = request.headers['accept-encoding'] ?? '';
        const packed = [['br', '.br'], ['gzip', '.gz']].find(([coding, end]) => accepted.includes(coding) && existsSync(file + end));
        if (packed) headers['Content-Encoding'] = packed[0];
        const sent = packed ? file + packed[1] : file;
        headers['Content-Length'] = statSync(sent).size;
        response.writeHead(200, headers);
        if (request.method === 'HEAD') return response.end();
        createReadStream(sent).pipe(response);
    });
    return new Promise((resolve, reject) => {
        server.once('error', reject);
        server.listen(port, address, () =>
            resolve({
                port: server.address().port,
                requests,
                unref: () => server.unref(), // goes on serving, but keeps nobody from ending
                close: () => new Promise((done) => (server.close(done), server.closeAllConnections())),
            }),
        );
    });
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
    const [folder, port = '8080', address = '0.0.0.0'] = process.argv.slice(2);
    if (!folder) {
        console.error('usage: node web/server.mjs FOLDER [PORT] [ADDRESS]');
        process.exit(2);
    }
    serve(folder, Number(port), address).catch((reason) => {
        console.error(reason.code === 'EADDRINUSE' ? `Port ${port} is taken: choose another with --port.` : String(reason));
        process.exit(1);
    });
}

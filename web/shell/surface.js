// The size, sharpness and surroundings of the drawing surface.

const asks = (query) => matchMedia(query).matches;

/// Keeps the program's idea of its surface true. @param drawNow draws a frame in the same task: a canvas whose size was
/// set is blank until then.
export function watchSurface(surface, program, drawNow) {
    const probe = document.getElementById('insets');
    let touch = asks('(pointer: coarse)');
    let deviceSize = null;

    const tell = () => {
        const ratio = devicePixelRatio || 1;
        let width = Math.round(surface.clientWidth * ratio);
        let height = Math.round(surface.clientHeight * ratio);
        // The true number of device pixels, where the browser tells it; one that is far off is in css pixels after all.
        if (deviceSize && Math.abs(deviceSize.width - width) <= 2 && Math.abs(deviceSize.height - height) <= 2)
            ({ width, height } = deviceSize);
        if (surface.width !== width) surface.width = width;
        if (surface.height !== height) surface.height = height;
        const inset = getComputedStyle(probe);
        const flags = asks('(prefers-color-scheme: dark)') | (asks('(prefers-reduced-motion: reduce)') << 1) | (touch << 2);
        program.surface(width / ratio, height / ratio, ratio, parseFloat(inset.paddingTop), parseFloat(inset.paddingRight),
                        parseFloat(inset.paddingBottom), parseFloat(inset.paddingLeft), flags);
    };
    const changed = () => {
        tell();
        drawNow();
    };
    const observer = new ResizeObserver((entries) => {
        const size = entries[0].devicePixelContentBoxSize?.[0];
        deviceSize = size ? { width: size.inlineSize, height: size.blockSize } : null;
        changed();
    });
    try {
        observer.observe(surface, { box: 'device-pixel-content-box' });
    } catch {
        observer.observe(surface); // WebKit knows no device pixel box, and says so by throwing
    }
    for (const query of ['(prefers-color-scheme: dark)', '(prefers-reduced-motion: reduce)'])
        matchMedia(query).addEventListener('change', changed);
    const watchRatio = () =>
        matchMedia(`(resolution: ${devicePixelRatio}dppx)`).addEventListener('change', () => (changed(), watchRatio()), { once: true });
    watchRatio();

    tell();
    return {
        /// The last pointer was a finger, or was not.
        touched(now) {
            if (now === touch) return;
            touch = now;
            tell();
        },
    };
}

// Fingers, mouse and pen on the picture. Two fingers are one pinch and never a click; the program hears css pixels.

const isTouch = (event) => event.pointerType !== 'mouse';

/// @param heard(touch, ended)  after each event; `ended`: a press was let go, which may have to open a keyboard or a file
export function listenToPointers(surface, program, heard) {
    const down = new Map(); // pointerId -> place
    let pinching = false;
    let span = 0;
    const place = (event) => {
        const box = surface.getBoundingClientRect();
        return { x: event.clientX - box.left, y: event.clientY - box.top };
    };
    const between = () => {
        const [a, b] = [...down.values()];
        return { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2, span: Math.max(1, Math.hypot(a.x - b.x, a.y - b.y)) };
    };

    surface.addEventListener('pointerdown', (event) => {
        if (event.pointerType === 'mouse' && event.button !== 0) return;
        event.preventDefault(); // no mouse events made up after a finger: they would take the focus from a field just opened
        document.activeElement?.blur();
        surface.setPointerCapture(event.pointerId);
        down.set(event.pointerId, place(event));
        if (down.size === 1) {
            const { x, y } = place(event);
            program.button(x, y, 1, isTouch(event));
        } else if (down.size === 2) {
            pinching = true;
            const { x, y, span: now } = between();
            span = now;
            program.pinch(x, y, 1);
        }
        heard(isTouch(event), false);
    });
    surface.addEventListener('pointermove', (event) => {
        const { x, y } = place(event);
        if (down.has(event.pointerId)) down.set(event.pointerId, { x, y });
        if (pinching) {
            if (down.size !== 2) return;
            const middle = between();
            program.pinch(middle.x, middle.y, middle.span / span);
            span = middle.span;
        } else {
            program.move(x, y, isTouch(event));
        }
        heard(isTouch(event), false);
    });
    const lift = (event) => {
        if (!down.delete(event.pointerId)) return;
        const touch = isTouch(event);
        if (!pinching) {
            const { x, y } = event.type === 'pointercancel' ? { x: -1e6, y: -1e6 } : place(event); // let go where nothing is
            program.button(x, y, 0, touch);
            if (touch) program.leave();
        } else if (down.size === 0) {
            pinching = false;
        }
        heard(touch, event.type === 'pointerup');
    };
    surface.addEventListener('pointerup', lift);
    surface.addEventListener('pointercancel', lift);
    surface.addEventListener('pointerleave', (event) => {
        if (isTouch(event) || down.size) return;
        program.leave();
        heard(false, false);
    });
    surface.addEventListener(
        'wheel',
        (event) => {
            event.preventDefault();
            const unit = [1, 16, 400][event.deltaMode]; // css pixels a pixel, line, page
            const { x, y } = place(event);
            // A touchpad's pinch comes as a wheel with Control.
            if (event.ctrlKey) program.pinch(x, y, Math.exp((-event.deltaY * unit) / 100));
            else program.wheel((-event.deltaX * unit) / 100, (-event.deltaY * unit) / 100);
            heard(false, false);
        },
        { passive: false },
    );
    surface.addEventListener('contextmenu', (event) => event.preventDefault());
    // iOS zooms the page by its own gesture events whatever touch-action says.
    for (const kind of ['gesturestart', 'gesturechange']) document.addEventListener(kind, (event) => event.preventDefault());
}

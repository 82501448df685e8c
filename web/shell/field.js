// A text field of the page, laid over the picture while a text is edited: caret, paste, dictation and the phone's own
// keyboard are the browser's.

export function makeField(program, heard) {
    const field = document.getElementById('field');
    let name = null;

    const close = (keep) => {
        if (name === null) return;
        const closing = name;
        name = null;
        field.hidden = true;
        program.typed(closing, field.value, keep ? 1 : 0);
        heard();
    };
    field.addEventListener('blur', () => close(true));
    field.addEventListener('keydown', (event) => {
        if (event.isComposing) return;
        if (event.key === 'Enter') close(true);
        if (event.key === 'Escape') close(false);
    });
    // Where the keyboard lies over the page instead of making it shorter, keep the field in what is left to be seen.
    const follow = () => {
        const seen = window.visualViewport;
        if (!seen || field.hidden) return;
        const over = field.offsetTop + field.offsetHeight + 8 - (seen.offsetTop + seen.height);
        field.style.transform = over > 0 ? `translateY(${-over}px)` : '';
    };
    window.visualViewport?.addEventListener('resize', follow);
    window.visualViewport?.addEventListener('scroll', follow);

    /// Has to run inside the tap that asked for it: phones raise the keyboard only then.
    return function edit(request) {
        close(true);
        name = request.name;
        field.value = request.text;
        field.inputMode = /^[-+\d.,\s]+$/.test(request.text) ? 'decimal' : 'text';
        field.setAttribute('aria-label', request.name);
        Object.assign(field.style, {
            left: `${request.x}px`, top: `${request.y}px`, width: `${request.width}px`, height: `${request.height}px`, transform: '',
        });
        field.hidden = false;
        field.focus();
        field.select();
        follow();
    };
}

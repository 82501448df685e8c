// The keyboard. Fields and buttons of the page itself keep their keys; the rest goes to the program.

const nameOf = (key) => (/^[a-z]$/.test(key) ? key.toUpperCase() : key === 'Meta' ? 'Control' : key);
const ownsKeys = (node) => node instanceof HTMLElement && node.matches('input, textarea, select, a, dialog *, #update *');

export function listenToKeys(program, heard) {
    const held = new Set();
    const release = () => {
        held.forEach((name) => program.key(name, 0));
        held.clear();
        heard();
    };
    addEventListener('keydown', (event) => {
        if (ownsKeys(event.target) || event.isComposing || event.key === 'Tab') return;
        // A proxy of a control takes Enter and Space as its own click, unless a field inside the picture is being typed in.
        const writing = program.wants_text();
        if (!writing && event.target.closest?.('#controls') && (event.key === 'Enter' || event.key === ' ')) return;
        const command = event.ctrlKey || event.metaKey;
        if (command && event.key.toLowerCase() === 'v') return; // comes as 'paste'
        const name = nameOf(event.key);
        if (program.key(name, 1)) {
            held.add(name);
            const ours = writing || /^(Arrow|Page|Home|End| )/.test(name) || (command && /^[ZY]$/.test(name));
            if (ours) event.preventDefault();
        }
        if (event.key.length === 1 && !command) {
            program.character(event.key.codePointAt(0));
            if (writing) event.preventDefault();
        }
        heard();
    });
    addEventListener('keyup', (event) => {
        const name = nameOf(event.key);
        if (!held.delete(name)) return;
        program.key(name, 0);
        if (name === 'Control') release(); // macOS tells of no key let go while Command is held
        heard();
    });
    addEventListener('blur', release);
    addEventListener('paste', (event) => {
        if (ownsKeys(event.target) || !program.wants_text()) return;
        for (const c of event.clipboardData.getData('text').replace(/\s+/g, ' ')) program.character(c.codePointAt(0));
        event.preventDefault();
        heard();
    });
}

// The picture says nothing to a screen reader, so the page says it: a transparent, focusable proxy over each control, the
// answers as a table, and one polite line for what has just changed. The text view shows the same elements.

const announcePause = 500; // ms: one sentence when things have settled, not one a frame

const inputs = ['spinbutton', 'slider'];

function proxyFor({ id, role }, press, writing) {
    const node = document.createElement(inputs.includes(role) || role === 'img' ? 'div' : 'button');
    node.id = `control:${id}`;
    node.dataset.role = role;
    if (node.tagName === 'DIV' || role === 'checkbox') node.setAttribute('role', role);
    if (role === 'img') return node;
    if (node.tagName === 'BUTTON') node.type = 'button';
    node.tabIndex = 0;
    node.addEventListener('click', () => press(id));
    if (role === 'slider') node.addEventListener('focus', () => press(id)); // then the arrow keys move it
    if (role === 'spinbutton')
        node.addEventListener('keydown', (event) => {
            if (writing() || (event.key !== 'Enter' && event.key !== ' ')) return;
            event.preventDefault();
            event.stopPropagation();
            node.click();
        });
    return node;
}

const isOn = (value) => /^(1|true|on|yes|chosen|selected|checked)$/i.test(value);

function describe(node, { role, name, value, x, y, width, height }) {
    const set = (attribute, text) => node.getAttribute(attribute) === text || node.setAttribute(attribute, text);
    const toggles = role === 'tab' || role === 'option';
    if (role === 'checkbox') set('aria-checked', String(isOn(value)));
    else if (toggles) set('aria-pressed', String(isOn(value)));
    else if (inputs.includes(role)) {
        const number = parseFloat(value);
        if (Number.isFinite(number)) set('aria-valuenow', String(number));
        set('aria-valuetext', value);
    }
    set('aria-label', value && ['button', 'img'].includes(role) ? `${name}: ${value}` : name);
    const words = value && !toggles && role !== 'checkbox' ? `${name} ${value}` : name;
    if (node.textContent !== words) node.textContent = words;
    Object.assign(node.style, { left: `${x}px`, top: `${y}px`, width: `${width}px`, height: `${height}px` });
}

/// @returns { sync(), announce(sentence) }
export function makeMirror(program, heard) {
    const controls = document.getElementById('controls');
    const rows = document.querySelector('#answers tbody');
    const heading = document.querySelector('h1');
    const faults = document.getElementById('faults');
    const status = document.getElementById('status');
    const press = (id) => {
        program.press(id);
        heard();
    };
    const texts = {};
    const changed = (what) => {
        const now = program[what]();
        if (texts[what] === now) return null;
        texts[what] = now;
        return JSON.parse(now);
    };

    function syncControls(list) {
        const stale = new Map([...controls.children].map((node) => [node.id, node]));
        let before = null;
        for (const control of list) {
            const id = `control:${control.id}`;
            let node = stale.get(id);
            if (node && node.dataset.role !== control.role) node = null;
            if (node) stale.delete(id);
            else node = proxyFor(control, press, program.wants_text);
            describe(node, control);
            const next = before ? before.nextSibling : controls.firstChild;
            if (node !== next) controls.insertBefore(node, next);
            before = node;
        }
        // Where the focused control went away, focus stays in the list and not at the top of the page.
        const lost = [...stale.values()].some((node) => node === document.activeElement);
        stale.forEach((node) => node.remove());
        if (lost) controls.focus();
    }

    function syncAnswers(answers) {
        heading.textContent = `Groundgrain: ${answers.plan}`;
        document.title = `${answers.plan} – Groundgrain`;
        faults.textContent = (answers.faults ?? []).join(' ');
        document.getElementById('caution').textContent = answers.caution;
        rows.replaceChildren(
            ...answers.answers.map((answer) => {
                const row = document.createElement('tr');
                row.dataset.key = answer.key;
                for (const [tag, text] of [['th', answer.name], ['td', answer.says], ['td', answer.grade ?? ''], ['td', answer.why]]) {
                    const cell = document.createElement(tag);
                    if (tag === 'th') cell.scope = 'row';
                    cell.textContent = text;
                    row.append(cell);
                }
                return row;
            }),
        );
    }

    let waiting = 0;
    return {
        sync() {
            const list = changed('controls');
            if (list) syncControls(list);
            const answers = changed('answers');
            if (answers) syncAnswers(answers);
        },
        announce(sentence) {
            clearTimeout(waiting);
            waiting = setTimeout(() => (status.textContent = sentence), announcePause);
        },
    };
}

// Files leave and enter by the person's own hand only.

const standalone = () => navigator.standalone || matchMedia('(display-mode: standalone)').matches;

/// Hands over a file. Chromium asks where to; an installed page on a phone shares, for a download would trap it; else a download.
export async function saveFile(name, text) {
    const file = new File([text], name, { type: 'application/json' });
    const coarse = matchMedia('(pointer: coarse)').matches;
    try {
        if (window.showSaveFilePicker && !coarse) {
            const handle = await showSaveFilePicker({ suggestedName: name });
            const out = await handle.createWritable();
            await out.write(file);
            return await out.close();
        }
        if (coarse && standalone() && navigator.canShare?.({ files: [file] })) return await navigator.share({ files: [file] });
    } catch (reason) {
        if (reason.name === 'AbortError') return; // the person thought better of it
    }
    const link = document.createElement('a');
    link.href = URL.createObjectURL(file);
    link.download = name;
    link.click();
    setTimeout(() => URL.revokeObjectURL(link.href), 60000);
}

/// @returns openFile(): lets the person pick a plan file. Dropping one on the page does the same.
export function makeOpener(program, heard) {
    const picker = document.getElementById('file');
    const read = async (file) => {
        if (!file) return;
        program.opened(file.name, await file.text());
        heard();
    };
    picker.addEventListener('change', () => {
        read(picker.files[0]);
        picker.value = ''; // so that the same file can be picked again
    });
    addEventListener('dragover', (event) => event.preventDefault());
    addEventListener('drop', (event) => {
        event.preventDefault();
        read(event.dataTransfer.files[0]);
    });
    return () => picker.click();
}

export function copyText(text) {
    navigator.clipboard?.writeText(text).catch(() => {
        // refused: nothing was asked of the page that it could still do
    });
}

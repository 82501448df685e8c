// What stays on the device between visits: each text in two slots that are written in turn, with a count and a checksum,
// so that a write cut short by a killed tab leaves the one before it whole.

function checksum(text) {
    let sum = 0x811c9dc5; // FNV-1a, 32 bits: finds damage, keeps no secret
    for (let i = 0; i < text.length; ++i) sum = Math.imul(sum ^ text.charCodeAt(i), 0x01000193);
    return (sum >>> 0).toString(16);
}

const slots = (name) => [`groundgrain.${name}.0`, `groundgrain.${name}.1`];

function readSlot(storage, key) {
    try {
        const kept = JSON.parse(storage.getItem(key));
        if (typeof kept.text === 'string' && kept.sum === checksum(kept.text) && kept.count >= 0) return kept;
    } catch {
        // not there, not ours or damaged: the other slot answers
    }
    return { count: -1, text: null };
}

/// The text last kept under `name`, or null.
export function recall(storage, name) {
    const [a, b] = slots(name).map((key) => readSlot(storage, key));
    return (a.count > b.count ? a : b).text;
}

/// @returns whether it could be kept (a full or forbidden storage: false)
export function keep(storage, name, text) {
    const keys = slots(name);
    const [a, b] = keys.map((key) => readSlot(storage, key));
    const [newer, older] = a.count > b.count ? [a, keys[1]] : [b, keys[0]];
    if (newer.text === text) return true;
    try {
        storage.setItem(older, JSON.stringify({ count: newer.count + 1, sum: checksum(text), text }));
        return true;
    } catch {
        return false;
    }
}

import assert from 'node:assert/strict';
import { test } from 'node:test';
import { keep, recall } from '../../web/shell/keep.js';

class Storage {
    map = new Map();
    getItem(key) {
        return this.map.get(key) ?? null;
    }
    setItem(key, value) {
        if (this.full) throw new Error('quota');
        this.map.set(key, String(value));
    }
}

test('what was kept last is recalled, and names do not mix', () => {
    const storage = new Storage();
    for (const text of ['one', 'two', 'three', 'Lehm, naß – 0,9 m']) {
        assert.ok(keep(storage, 'plan', text));
        assert.equal(recall(storage, 'plan'), text);
    }
    assert.equal(recall(storage, 'preferences'), null);
});

test('a write cut short leaves the one before it', () => {
    const storage = new Storage();
    for (const text of ['older', 'newer']) keep(storage, 'plan', text);
    const [slot, kept] = [...storage.map].find(([, value]) => JSON.parse(value).text === 'newer');
    for (let length = 0; length < kept.length; ++length) {
        storage.map.set(slot, kept.slice(0, length));
        assert.equal(recall(storage, 'plan'), 'older', `cut at ${length}`);
    }
    storage.map.set(slot, kept.replace('newer', 'never'));
    assert.equal(recall(storage, 'plan'), 'older', 'a wrong checksum');
    assert.ok(keep(storage, 'plan', 'newest'));
    assert.equal(recall(storage, 'plan'), 'newest');
});

test('a full storage is said, and keeps what it has', () => {
    const storage = new Storage();
    keep(storage, 'plan', 'kept');
    storage.full = true;
    assert.equal(keep(storage, 'plan', 'lost'), false);
    assert.equal(recall(storage, 'plan'), 'kept');
});

test('the same text is not written again', () => {
    const storage = new Storage();
    keep(storage, 'plan', 'same');
    const before = JSON.stringify([...storage.map]);
    assert.ok(keep(storage, 'plan', 'same'));
    assert.equal(JSON.stringify([...storage.map]), before);
});

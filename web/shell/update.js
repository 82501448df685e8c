// The service worker keeps the page for use without a network. A new version waits until the person takes it: never in the
// middle of work, and never without the plan having been kept.

export function offerUpdates(keepAll) {
    const workers = navigator.serviceWorker;
    if (!workers || !isSecureContext || !location.protocol.startsWith('http')) return;
    const banner = document.getElementById('update');
    let taken = false;

    const offer = (registration) => {
        banner.hidden = false;
        document.getElementById('update-take').onclick = () => {
            keepAll();
            taken = true;
            registration.waiting?.postMessage('take over');
        };
        document.getElementById('update-later').onclick = () => (banner.hidden = true);
    };
    workers.addEventListener('controllerchange', () => {
        if (taken) location.reload();
        taken = false;
    });
    workers
        .register('sw.js', { updateViaCache: 'none' })
        .then((registration) => {
            if (registration.waiting && workers.controller) offer(registration);
            registration.addEventListener('updatefound', () => {
                const coming = registration.installing;
                coming?.addEventListener('statechange', () => {
                    if (coming.state === 'installed' && workers.controller) offer(registration);
                });
            });
            // A page that stays open for days asks when it is looked at again.
            document.addEventListener('visibilitychange', () => {
                if (document.visibilityState === 'visible') registration.update().catch(() => {});
            });
        })
        .catch(() => {
            // No worker (private window, no space): the page works, but not without a network.
        });
}

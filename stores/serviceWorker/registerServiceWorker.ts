/* The service worker keeps the app on the device, so that it opens without a network. A new version waits until a
 * person takes it: this page goes on with the one it was opened with. */

const hourMs = 60 * 60 * 1000;
let isApplying = false;

/** Registers the service worker of the build and looks for a newer version hourly, when the page comes back into view
 * and when the network returns.
 * @param onUpdate gets what puts the waiting version in place
 */
export function registerServiceWorker(onUpdate: (apply: () => void) => void): void {
  if (__DEV__ || typeof navigator === 'undefined' || !('serviceWorker' in navigator)) return;
  const { serviceWorker } = navigator;
  let hadController = serviceWorker.controller !== null;
  serviceWorker.addEventListener('controllerchange', () => {
    const isFirst = !hadController;
    hadController = true;
    if (isFirst) return; // the first visit: the worker takes over a page that is the same version
    if (isApplying) window.location.reload();
    // another tab took the new version: this page is offered it too, not thrown out of its run
    else onUpdate(() => window.location.reload());
  });
  const offer = (worker: ServiceWorker | null) => {
    if (!worker || !serviceWorker.controller) return;
    onUpdate(() => {
      isApplying = true;
      worker.postMessage({ type: 'SKIP_WAITING' });
    });
  };
  void serviceWorker
    .register('/sw.js', { updateViaCache: 'none' })
    .then((registration: ServiceWorkerRegistration | undefined) => {
      if (!registration) return; // a browser that blocks them answers nothing
      offer(registration.waiting);
      registration.addEventListener('updatefound', () => {
        const worker = registration.installing;
        worker?.addEventListener('statechange', () => {
          if (worker.state === 'installed') offer(worker);
        });
      });
      const check = () => void registration.update().catch(() => undefined);
      document.addEventListener('visibilitychange', () => {
        if (document.visibilityState === 'visible') check();
      });
      window.addEventListener('online', check);
      setInterval(check, hourMs);
    })
    // private windows and plain http allow none: the app works, but only with the network
    .catch(() => undefined);
}

/** The page's end of the worker that serves it without a network. */

export interface OfflineEvents {
  /** A newer version has been fetched and waits. */
  newer(): void;
  failed(reason: string): void;
}

/** To be called once the page has what it needs, so that fetching the rest is in no one's way. In development there is no such worker. */
export function keepOffline(events: OfflineEvents): void {
  const { serviceWorker } = navigator as { serviceWorker?: ServiceWorkerContainer };
  if (!import.meta.env.PROD || serviceWorker === undefined) return;

  const watch = (registration: ServiceWorkerRegistration) => {
    const worker = registration.installing;
    const isUpdate = registration.active !== null;
    worker?.addEventListener('statechange', () => {
      if (worker.state === 'installed' && isUpdate) events.newer();
      if (worker.state === 'redundant' && !isUpdate) events.failed('part of the page could not be fetched or stored');
    });
  };
  serviceWorker.register('./offline.js').then(
    (registration) => {
      if (registration.waiting !== null) events.newer();
      watch(registration);
      registration.addEventListener('updatefound', () => watch(registration));
    },
    (error: Error) => events.failed(error.message),
  );
}

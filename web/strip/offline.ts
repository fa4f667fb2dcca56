import { registerSW } from 'virtual:pwa-register'
import { flush } from '../files/keeping.ts'
import { useNetworkStore } from './network-store.ts'
import { useNoticeStore } from './notice-store.ts'

/** Keeps every file for use without a network. A new version is offered, and taken when the user says so. */
export function keepOffline(): void {
  if (!('serviceWorker' in navigator)) return
  const update = registerSW({
    immediate: true,
    onOfflineReady: () => useNetworkStore.setState({ keptOffline: true }),
    onNeedRefresh() {
      useNoticeStore.getState().say({
        id: 'update',
        severity: 'remark',
        text: 'A newer version is ready. Your plant is kept.',
        actions: [
          {
            name: 'Take it now',
            run: () => void flush().then(() => update(true)),
          },
        ],
      })
    },
  })
  navigator.serviceWorker.ready.then(
    () => useNetworkStore.setState({ keptOffline: true }),
    () => undefined,
  )
}

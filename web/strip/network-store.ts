import { create } from 'zustand'

interface NetworkState {
  readonly online: boolean
  /** The service worker keeps every file: the window opens without a network. */
  readonly keptOffline: boolean
}

export const useNetworkStore = create<NetworkState>()(() => ({
  online: navigator.onLine,
  keptOffline: false,
}))

export function watchNetwork(): void {
  const look = () => useNetworkStore.setState({ online: navigator.onLine })
  window.addEventListener('online', look)
  window.addEventListener('offline', look)
}

import { useSettingsStore } from '../store/settings-store.ts'

const dark = window.matchMedia('(prefers-color-scheme: dark)')

function apply(): void {
  const { theme } = useSettingsStore.getState()
  const inForce = theme === 'system' ? (dark.matches ? 'dark' : 'light') : theme
  document.documentElement.dataset.theme = inForce
}

/** Keeps `data-theme` on the root in step with the setting and the system. */
export function followTheme(): void {
  apply()
  dark.addEventListener('change', apply)
  useSettingsStore.subscribe(apply)
}

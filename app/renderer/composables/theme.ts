import { onBeforeUnmount, ref, watch } from 'vue'
import type { Inks } from '../figures/paint-map'
import { useViewStore } from '../stores/view'

const isDark = ref(false)

/** Keeps the page in the theme that the person, or else their system, wants. Called once, by the window. */
export function useTheme(): void {
  const view = useViewStore()
  const system = window.matchMedia('(prefers-color-scheme: dark)')
  const settle = (): void => {
    isDark.value = view.theme === 'dark' || (view.theme === 'system' && system.matches)
    document.documentElement.dataset['theme'] = isDark.value ? 'dark' : 'light'
  }
  system.addEventListener('change', settle)
  watch(() => view.theme, settle, { immediate: true })
  onBeforeUnmount(() => system.removeEventListener('change', settle))
}

/** The page's inks for a canvas; reading them in an effect makes it run again when the theme changes. */
export function pageInks(): Inks {
  void isDark.value
  const style = getComputedStyle(document.documentElement)
  const ink = (name: string): string => style.getPropertyValue(`--${name}`).trim()
  return { ground: ink('ground'), ink: ink('ink'), quiet: ink('quiet'), rule: ink('rule'), blank: ink('blank') }
}

export function useIsDark(): typeof isDark {
  return isDark
}

import { computed, onBeforeUnmount, ref, watch } from 'vue'
import type { Inks } from '../figures/paint-map'
import { useViewStore } from '../stores/view'

const isDark = ref(false)

/** Keeps the page in the theme that the person, or else their system, wants. Called once, by the window. */
export function useTheme(): void {
  const view = useViewStore()
  const system = window.matchMedia('(prefers-color-scheme: dark)')
  const settle = (): void => {
    const dark = view.theme === 'dark' || (view.theme === 'system' && system.matches)
    // The style sheet's turn first: the inks are read from it when `isDark` changes.
    document.documentElement.dataset['theme'] = dark ? 'dark' : 'light'
    isDark.value = dark
  }
  system.addEventListener('change', settle)
  watch(() => view.theme, settle, { immediate: true })
  onBeforeUnmount(() => system.removeEventListener('change', settle))
}

/** Read from the style sheet once a theme: each reading has the browser settle all styles first. */
const inks = computed((): Inks => {
  void isDark.value
  const style = getComputedStyle(document.documentElement)
  const ink = (name: string): string => style.getPropertyValue(`--${name}`).trim()
  return { ground: ink('ground'), ink: ink('ink'), quiet: ink('quiet'), rule: ink('rule'), blank: ink('blank') }
})

/** The page's inks for a canvas; reading them in an effect makes it run again when the theme changes. */
export function pageInks(): Inks {
  return inks.value
}

export function useIsDark(): typeof isDark {
  return isDark
}

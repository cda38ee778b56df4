import type { Theme } from './state';

const key = 'fellreach-theme';

/** applyTheme sets the colours of the page; `system` follows the machine. */
export function applyTheme(theme: Theme): void {
  if (theme === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  try {
    localStorage.setItem(key, theme);
  } catch {
    // Without storage the choice lasts as long as the page.
  }
}

export function rememberedTheme(): Theme {
  try {
    const found = localStorage.getItem(key);
    if (found === 'light' || found === 'dark') return found;
  } catch {
    // As above.
  }
  return 'system';
}

/** colour reads a colour of the style sheet as the present theme has it, as the map needs it. */
export function colour(name: string): string {
  const probe = document.createElement('span');
  probe.className = 'probe';
  probe.style.setProperty('color', `var(--${name})`);
  document.body.append(probe);
  const found = getComputedStyle(probe).color;
  probe.remove();
  return found;
}

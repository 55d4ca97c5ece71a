import {type Preferences} from '#shared/session/session';

/** Shows the page in the person's theme; `system` leaves the choice to the device. */
export function applyTheme(theme: Preferences['theme']): void {
  if (theme === 'system') document.documentElement.removeAttribute('data-theme');
  else document.documentElement.setAttribute('data-theme', theme);
}

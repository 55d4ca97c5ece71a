const NAMES = [
  'ink',
  'muted',
  'rule',
  'pine',
  'measured',
  'output',
  'vermilion',
  'band',
  'shade',
  'sheet',
] as const;
export type Palette = Readonly<Record<(typeof NAMES)[number], string>>;

/** The tokens as the canvas needs them: plain colours. */
export function readPalette(element: Element): Palette {
  const style = getComputedStyle(element);
  return Object.fromEntries(
    NAMES.map((name) => [name, style.getPropertyValue(`--${name}`).trim()]),
  ) as Palette;
}

/** Calls back when the page changes between light and dark; returns how to stop. */
export function onThemeChange(callback: () => void): () => void {
  const dark = matchMedia('(prefers-color-scheme: dark)');
  const observer = new MutationObserver(callback);
  observer.observe(document.documentElement, {attributeFilter: ['data-theme']});
  dark.addEventListener('change', callback);
  return () => {
    observer.disconnect();
    dark.removeEventListener('change', callback);
  };
}

/** How the lines of a panel differ: always by their dashes, by one hue and ink besides. */
export interface LineStyle {
  tone: 'ink' | 'accent' | 'ink2';
  dash: number[];
}

const DASHES = [[], [8, 4], [2, 3], [12, 3, 2, 3], [5, 5], [16, 4]];
const TONES = ['ink', 'accent', 'ink2'] as const;

/** Eighteen different lines; from there on they begin again. */
export function lineStyle(index: number): LineStyle {
  const round = Math.floor(index / DASHES.length);
  return { tone: TONES[(index + round) % TONES.length]!, dash: DASHES[index % DASHES.length]! };
}

/** A colour of the theme as it is now, in a form that a canvas knows. */
export function themeColour(within: HTMLElement, token: string): string {
  const probe = document.createElement('span');
  probe.style.color = `var(--color-${token})`;
  within.append(probe);
  const { color } = getComputedStyle(probe);
  probe.remove();
  return color;
}

/** Calls back when light becomes dark or the other way round; the answer ends that. */
export function onThemeChange(changed: () => void): () => void {
  const scheme = matchMedia('(prefers-color-scheme: dark)');
  const observer = new MutationObserver(changed);
  scheme.addEventListener('change', changed);
  observer.observe(document.documentElement, { attributeFilter: ['data-theme'] });
  return () => {
    scheme.removeEventListener('change', changed);
    observer.disconnect();
  };
}

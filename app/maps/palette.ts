import type { RasterInks } from './raster.ts';

/** Colours of the page as the maps need them: as text for strokes, as numbers for pixels. A new object when the theme changes. */
export interface Palette {
  readonly ink: string;
  readonly paper: string;
  readonly fill: string;
  readonly separator: string;
  readonly crosshair: string;
  readonly inks: RasterInks;
}

function readPalette(): Palette {
  const style = getComputedStyle(document.documentElement);
  const of = (name: string): string => style.getPropertyValue(name).trim();
  const ink = of('--ink');
  const fill = of('--fill');
  return {
    ink,
    paper: of('--paper'),
    fill,
    separator: of('--separator'),
    crosshair: of('--ink-soft'),
    inks: { ink: numbersOf(ink), fill: numbersOf(fill) },
  };
}

/** "#rrggbb" as three numbers, 0 to 255. */
export function numbersOf(hex: string): readonly [number, number, number] {
  const value = Number.parseInt(hex.slice(1, 7), 16);
  return Number.isNaN(value) ? [0, 0, 0] : [value >> 16, (value >> 8) & 255, value & 255];
}

let current: Palette | null = null;
const listeners = new Set<() => void>();

/** The colours in force. */
export function palette(): Palette {
  current ??= readPalette();
  return current;
}

/** Tells when the colours have changed: by the switch of the page, or by the system. */
export function followPalette(changed: () => void): () => void {
  if (listeners.size === 0) {
    watcher.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
    system.addEventListener('change', renew);
  }
  listeners.add(changed);
  return () => {
    listeners.delete(changed);
    if (listeners.size > 0) return;
    watcher.disconnect();
    system.removeEventListener('change', renew);
  };
}

function renew(): void {
  current = null;
  for (const listener of listeners) listener();
}

const watcher = new MutationObserver(renew);
const system = matchMedia('(prefers-color-scheme: dark)');

/** Colours and faces of a drawing, as the canvas takes them. */
export interface PlotTheme {
  paper: string;
  ink: string;
  inkSoft: string;
  edge: string;
  line: string;
  water: string;
  brick: string;
  brickWash: string;
  text: string;
  figures: string;
}

const tokens = {
  paper: '--panel',
  ink: '--ink',
  inkSoft: '--ink-soft',
  edge: '--edge',
  line: '--line',
  water: '--water',
  brick: '--brick',
  brickWash: '--brick-wash',
} as const;

let current: PlotTheme | null = null;
const listeners = new Set<() => void>();

/** Tokens hold a light and a dark reading; only a used colour tells which one stands. */
function read(): PlotTheme {
  const probe = document.createElement('span');
  document.body.append(probe);
  const colours = Object.fromEntries(
    Object.entries(tokens).map(([name, token]) => {
      probe.style.color = `var(${token})`;
      return [name, getComputedStyle(probe).color];
    }),
  ) as Record<keyof typeof tokens, string>;
  const root = getComputedStyle(document.documentElement);
  probe.remove();
  return {
    ...colours,
    text: root.getPropertyValue('--font-text').trim(),
    figures: root.getPropertyValue('--font-mono').trim(),
  };
}

export function plotTheme(): PlotTheme {
  current ??= read();
  return current;
}

function renew() {
  current = null;
  listeners.forEach((listener) => {
    listener();
  });
}

let isWatching = false;

/** Calls `listener` when colours or faces change: the switch in the header, the system, a font that has come. */
export function onThemeChange(listener: () => void): () => void {
  listeners.add(listener);
  if (!isWatching) {
    isWatching = true;
    new MutationObserver(renew).observe(document.documentElement, {
      attributeFilter: ['data-theme', 'class'],
    });
    matchMedia('(prefers-color-scheme: dark)').addEventListener('change', renew);
    document.fonts.addEventListener('loadingdone', renew);
  }
  return () => listeners.delete(listener);
}

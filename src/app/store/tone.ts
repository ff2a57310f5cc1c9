/** Paper or night: the sheet follows the system unless a choice was made. */
import { useSyncExternalStore } from 'react';
import type { SheetTone } from '../figures/utilisationScale.ts';
import { useView } from './viewStore.ts';

const dark = matchMedia('(prefers-color-scheme: dark)');

function presentTone(): SheetTone {
  const { sheet } = useView.getState();
  if (sheet !== 'system') return sheet;
  return dark.matches ? 'night' : 'paper';
}

function subscribe(listener: () => void): () => void {
  dark.addEventListener('change', listener);
  const leave = useView.subscribe(listener);
  return () => {
    dark.removeEventListener('change', listener);
    leave();
  };
}

export function useTone(): SheetTone {
  return useSyncExternalStore(subscribe, presentTone);
}

/** Keeps `data-tone` of the page, which the style sheet reads, at the present tone. */
export function followTone(): void {
  const apply = () => {
    document.documentElement.dataset.tone = presentTone();
  };
  apply();
  subscribe(apply);
}

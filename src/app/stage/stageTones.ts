/** Colours of the stage, the same as the sheet's (`sheet/styles/tones.css`), as three reads them. */
import type { SheetTone } from '../figures/utilisationScale.ts';

export interface StageTone {
  readonly paper: string;
  /** Faces of the links under full light. */
  readonly solid: string;
  readonly ink: string;
  readonly faint: string;
  readonly accent: string;
  readonly over: string;
}

export const STAGE_TONES: Readonly<Record<SheetTone, StageTone>> = {
  paper: {
    paper: '#f6f1e6',
    solid: '#fdfaf2',
    ink: '#221f1a',
    faint: '#8f8675',
    accent: '#1d4db3',
    over: '#a1123f',
  },
  night: {
    paper: '#1b1e20',
    solid: '#4a4e50',
    ink: '#ece5d6',
    faint: '#7f796d',
    accent: '#8fb6ff',
    over: '#ff7c98',
  },
};

/** What is being looked at: the selected joint and bearing, the case on stage, the open panel, units and sheet. */
import { create } from 'zustand';
import type { BearingName } from '../../studies/results.ts';
import type { UnitSystem } from '../../units/format.ts';
import { useDocument } from './documentStore.ts';

export type PanelName = 'joint' | 'checks' | 'shares' | 'map' | 'worst' | 'ways' | 'cases';
export type SheetChoice = 'system' | 'paper' | 'night';

export interface ViewState {
  /** Index into the arm file's joints. */
  readonly joint: number;
  readonly bearing: BearingName | null;
  /** Check whose shares are shown, as `A radial`; null: the one that governs. */
  readonly check: string | null;
  /** Name of the case whose loads the present pose shows. */
  readonly case: string;
  readonly panel: PanelName;
  readonly units: UnitSystem;
  readonly sheet: SheetChoice;
}

export const useView = create<ViewState>(() => ({
  joint: 0,
  bearing: null,
  check: null,
  case: '',
  panel: 'joint',
  units: 'metric',
  sheet: 'system',
}));

export function selectJoint(joint: number, bearing: BearingName | null = null): void {
  useView.setState({ joint, bearing, check: null });
}

export function showCase(name: string): void {
  useView.setState({ case: name });
}

export function showPanel(panel: PanelName): void {
  useView.setState({ panel });
}

/** Keeps selection and case within the arm that is on the sheet. */
export function keepViewInArm(joints: readonly { readonly kind: string }[], cases: readonly string[]): void {
  const { joint, case: name } = useView.getState();
  const change: { joint?: number; bearing?: null; case?: string } = {};
  if (joints[joint]?.kind !== 'revolute') {
    change.joint = joints.findLastIndex((each) => each.kind === 'revolute');
    change.bearing = null;
  }
  if (!cases.includes(name)) change.case = cases[0] ?? '';
  if (Object.keys(change).length > 0) useView.setState(change);
}

/** The selected joint's place in the chain of revolute joints; -1 where there is none. */
export function useSelectedChainIndex(): number {
  const joint = useView((state) => state.joint);
  const file = useDocument((state) => state.draft ?? state.file);
  if (!file) return -1;
  return file.joints[joint]?.kind === 'revolute'
    ? file.joints.slice(0, joint).filter((each) => each.kind === 'revolute').length
    : -1;
}

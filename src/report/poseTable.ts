/** Loads at one pose as tables: the joint loads, and what each bearing carries. */
import type { BearingName, PoseResult } from '../studies/results.ts';
import type { UnitSystem } from '../units/format.ts';
import { shownUnit } from './shown.ts';
import { type Cell, type Column, decimalsFor, type Table } from './table.ts';

const NAMES: readonly BearingName[] = ['A', 'B', 'ring'];

function words(title: string): Column {
  return { title, unit: null, decimals: null };
}

/** One row a joint: force and moment on it (housing frame, about the joint origin), and the torque about its axis. */
export function jointLoadTable(result: PoseResult, system: UnitSystem = 'metric'): Table {
  const force = shownUnit('N', system);
  const moment = shownUnit('N·m', system);
  const forceDecimals = decimalsFor(result.joints.flatMap((joint) => joint.force.map(force.of)));
  const momentDecimals = decimalsFor(result.joints.flatMap((joint) => [...joint.moment, joint.torque].map(moment.of)));
  const forces = ['Fx', 'Fy', 'Fz'].map((title) => ({ title, unit: force.unit, decimals: forceDecimals }));
  const moments = ['Mx', 'My', 'Mz', 'torque'].map((title) => ({ title, unit: moment.unit, decimals: momentDecimals }));
  return {
    title: 'Joint loads',
    columns: [words('joint'), ...forces, ...moments],
    rows: result.joints.map((joint) => [
      joint.joint,
      ...joint.force.map(force.of),
      ...[...joint.moment, joint.torque].map(moment.of),
    ]),
  };
}

/** One row a bearing: size and vector of the radial load on it, and its axial load along the joint axis. */
export function bearingLoadTable(result: PoseResult, system: UnitSystem = 'metric'): Table {
  const force = shownUnit('N', system);
  const moment = shownUnit('N·m', system);
  const loads = result.joints.flatMap((joint) =>
    NAMES.flatMap((name) => {
      const load = joint.bearings[name];
      return load ? [{ joint: joint.joint, name, load }] : [];
    }),
  );
  const decimals = decimalsFor(loads.flatMap(({ load }) => [load.radial, load.axial].map(force.of)));
  const rings = loads.some(({ load }) => load.moment !== null);
  const column = (title: string): Column => ({ title, unit: force.unit, decimals });
  const momentDecimals = decimalsFor(
    loads.flatMap(({ load }) => (load.moment === null ? [] : [moment.of(load.moment)])),
  );
  let last = '';
  const rows = loads.map(({ joint, name, load }): Cell[] => {
    const shownName = joint === last ? '' : joint;
    last = joint;
    return [
      shownName,
      name,
      force.of(load.radial),
      ...load.radialVector.map(force.of),
      force.of(load.axial),
      ...(rings ? [load.moment === null ? null : moment.of(load.moment)] : []),
    ];
  });
  return {
    title: 'Bearing loads',
    columns: [
      words('joint'),
      words('bearing'),
      ...['radial', 'x', 'y', 'z', 'axial'].map(column),
      ...(rings ? [{ title: 'tilting moment', unit: moment.unit, decimals: momentDecimals }] : []),
    ],
    rows,
  };
}

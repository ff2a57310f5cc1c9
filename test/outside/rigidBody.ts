/**
 * An arm in a general-purpose rigid-body engine: joint loads by code and method other than ours. Everything here is made from
 * the `Arm` alone (no `Chain`, no kernel of ours), so that agreement says something.
 *
 * The engine gives the wrench of the parent ON the child body, world axes, torque then force, about the centre of mass of the
 * whole tree. The joint load is the opposite (outboard part ON the joint), about the joint origin, in the housing frame of the
 * arm file. Base frame and world frame are the same.
 */
import type { MainModule } from 'mujoco-js';
import type { Arm, LoadCase } from '../../src/arm/arm.ts';
import { armModel } from './armModel.ts';

/** An arm under one case. `out` [6n]: per revolute joint force N, moment N·m about the joint origin, file's housing frame. */
export interface OutsideArm {
  /** Revolute joints. */
  readonly n: number;
  /** Joint loads at rest. `pose` [n] rad; `tipForce`: unit vector, base frame, for a tip force of direction `any`. */
  statics(pose: ArrayLike<number>, out: Float64Array, tipForce?: ArrayLike<number> | null): void;
  /** Joint loads in motion (`speed` rad/s, `accel` rad/s²) from the force and torque sensors of inverse dynamics. */
  motion(
    pose: ArrayLike<number>,
    speed: ArrayLike<number>,
    accel: ArrayLike<number>,
    out: Float64Array,
    tipForce?: ArrayLike<number> | null,
  ): void;
  /** The engine's three calls for one pose at rest, nothing turned or shifted; gives one number of the result back. For timing. */
  bare(pose: ArrayLike<number>): number;
  /** Frees memory that the garbage collector cannot see. */
  close(): void;
}

let engine: Promise<MainModule> | null = null;
let models = 0;

/** Loads the engine (once) and builds `arm` under `load`, by default its first case. */
export async function outsideArm(arm: Arm, load: LoadCase = arm.cases[0]!): Promise<OutsideArm> {
  engine ??= import('mujoco-js').then(({ default: loadEngine }) => loadEngine());
  const mj = await engine;
  const files = mj.FS as unknown as { writeFile(path: string, text: string): void; unlink(path: string): void };
  const path = `/arm${models++}.xml`;
  files.writeFile(path, armModel(arm, load));
  const model = mj.MjModel.loadFromXML(path);
  files.unlink(path);
  if (!model) throw new Error('the outside engine refused the model');
  const data = new mj.MjData(model);

  const revolute = arm.joints.flatMap((joint, k) => (joint.kind === 'revolute' ? [k] : []));
  const n = revolute.length;
  const last = arm.joints.length;
  const roots = Array.from(model.body_rootid as Int32Array);
  // Views of the engine's memory; they die when that memory grows, so they are looked up again whenever one has.
  const look = () => ({
    qpos: data.qpos as Float64Array,
    qvel: data.qvel as Float64Array,
    qacc: data.qacc as Float64Array,
    interaction: data.cfrc_int as Float64Array,
    sensors: data.sensordata as Float64Array,
    applied: data.xfrc_applied as Float64Array,
    centre: data.xipos as Float64Array,
    treeCentre: data.subtree_com as Float64Array,
    position: data.xpos as Float64Array,
    rotation: data.xmat as Float64Array,
    tipPosition: data.site_xpos as Float64Array,
    tipRotation: data.site_xmat as Float64Array,
  });
  let view = look();
  const refresh = () => {
    if (view.qpos.length === 0) view = look();
    return view;
  };

  const place = (pose: ArrayLike<number>, speed: ArrayLike<number> | null, accel: ArrayLike<number> | null) => {
    const v = refresh();
    for (let i = 0; i < n; i++) {
      v.qpos[i] = pose[i]!;
      v.qvel[i] = speed ? speed[i]! : 0;
      v.qacc[i] = accel ? accel[i]! : 0;
    }
    mj.mj_kinematics(model, data);
    mj.mj_comPos(model, data);
  };

  /** The tip force as force and torque about the centre of mass of the last body, world axes. */
  const pushTip = (direction: ArrayLike<number> | null) => {
    const v = refresh();
    v.applied.fill(0);
    const force = load.tipForce;
    if (!force) return;
    let unit = direction ? Array.from(direction) : null;
    if (!unit && force.direction === 'base') unit = [...force.unit];
    if (!unit && force.direction === 'tool') unit = turn(v.tipRotation, 9 * n, force.unit);
    if (!unit) return;
    const f = unit.map((u) => u * force.magnitude * load.factor);
    const lever = [0, 1, 2].map((k) => v.tipPosition[3 * n + k]! - v.centre[3 * last + k]!);
    v.applied.set([...f, ...cross(lever, f)], 6 * last);
  };

  /** World force and moment of the parent on the child of joint i, moment about `about`, made the joint load in `out`. */
  const store = (i: number, force: readonly number[], moment: readonly number[], out: Float64Array) => {
    const v = refresh();
    const k = revolute[i]!;
    // Housing frame in the world: the parent body's frame, then the placement of the joint.
    const inParent = (w: readonly number[]) => turnBack(v.rotation, 9 * k, w);
    const inHousing = (w: readonly number[]) => turnBack(arm.joints[k]!.placement.rotation, 0, inParent(w));
    out.set(
      inHousing(force).map((x) => -x),
      6 * i,
    );
    out.set(
      inHousing(moment).map((x) => -x),
      6 * i + 3,
    );
  };

  return {
    n,
    statics(pose, out, tipForce = null) {
      place(pose, null, null);
      pushTip(tipForce);
      mj.mj_rnePostConstraint(model, data);
      const v = refresh();
      for (let i = 0; i < n; i++) {
        const body = revolute[i]! + 1;
        const torque = [...v.interaction.subarray(6 * body, 6 * body + 3)];
        const force = [...v.interaction.subarray(6 * body + 3, 6 * body + 6)];
        const lever = [0, 1, 2].map((k) => v.treeCentre[3 * roots[body]! + k]! - v.position[3 * body + k]!);
        const shift = cross(lever, force);
        store(
          i,
          force,
          torque.map((t, k) => t + shift[k]!),
          out,
        );
      }
    },
    motion(pose, speed, accel, out, tipForce = null) {
      place(pose, speed, accel);
      pushTip(tipForce);
      mj.mj_inverse(model, data);
      const v = refresh();
      for (let i = 0; i < n; i++) {
        const body = revolute[i]! + 1;
        const world = (at: number) => turn(v.rotation, 9 * body, [...v.sensors.subarray(at, at + 3)]);
        store(i, world(6 * i), world(6 * i + 3), out);
      }
    },
    bare(pose) {
      const v = refresh();
      for (let i = 0; i < n; i++) v.qpos[i] = pose[i]!;
      mj.mj_kinematics(model, data);
      mj.mj_comPos(model, data);
      mj.mj_rnePostConstraint(model, data);
      return v.interaction[6]!;
    },
    close() {
      data.delete();
      model.delete();
    },
  };
}

function cross(a: readonly number[], b: readonly number[]): number[] {
  return [a[1]! * b[2]! - a[2]! * b[1]!, a[2]! * b[0]! - a[0]! * b[2]!, a[0]! * b[1]! - a[1]! * b[0]!];
}

/** M v and Mᵀ v of the row-major matrix at `at`. */
function turn(m: ArrayLike<number>, at: number, v: ArrayLike<number>): number[] {
  return [0, 1, 2].map((r) => m[at + 3 * r]! * v[0]! + m[at + 3 * r + 1]! * v[1]! + m[at + 3 * r + 2]! * v[2]!);
}
function turnBack(m: ArrayLike<number>, at: number, v: ArrayLike<number>): number[] {
  return [0, 1, 2].map((c) => m[at + c]! * v[0]! + m[at + 3 + c]! * v[1]! + m[at + 6 + c]! * v[2]!);
}

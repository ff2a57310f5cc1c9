/**
 * Recursive Newton–Euler on a chain: the load on every joint at one pose.
 *
 * The joint load is the wrench that everything outboard of the joint puts ON the joint: force (N) and moment (N·m) about
 * the joint origin, in the joint's canonical housing frame. In statics the force is the weight outboard plus tip forces.
 * Sources: Luh, Walker & Paul, "On-line computational scheme for mechanical manipulators", 1980; Featherstone, Rigid Body
 * Dynamics Algorithms, 2008, ch. 5 (tag: from memory; tested against an outside engine).
 */
import { type Flat, type Numbers, rotate3, rotateBack3 } from '../math/vector.ts';
import { type Chain, type ChainCase, INERTIA, WRENCH } from './chain.ts';

/** Scratch of one thread for a chain of n joints. Nothing in it outlives a call except where a function says so. */
export interface PoseScratch {
  /** Gravity in each canonical link frame. [3n] */
  readonly gravity: Flat;
  readonly cos: Flat;
  readonly sin: Flat;
  /** Angular velocity, angular acceleration, linear acceleration of the link origin less gravity, link frame. [3n] each */
  readonly omega: Flat;
  readonly alpha: Flat;
  readonly accel: Flat;
  /** A base-fixed force in each link frame. [3n] */
  readonly force: Flat;
  readonly tmp: Flat;
}

export function poseScratch(n: number): PoseScratch {
  const flat = (size: number) => new Float64Array(size);
  return {
    gravity: flat(3 * n),
    cos: flat(n),
    sin: flat(n),
    omega: flat(3 * n),
    alpha: flat(3 * n),
    accel: flat(3 * n),
    force: flat(3 * n),
    tmp: flat(24),
  };
}

/** What the joints do: rates per revolute joint, rad/s and rad/s². */
export interface Rates {
  readonly speed: Numbers;
  readonly accel: Numbers;
}

/** Carries the vector at base or link i-1 into link i: out_i = Rz(q)ᵀ Rᵀ v. */
function inward(out: Flat, oo: number, chain: Chain, i: number, c: number, s: number, v: Numbers, vo: number): void {
  rotateBack3(out, oo, chain.rotation, 9 * i, v, vo);
  const x = out[oo]!;
  const y = out[oo + 1]!;
  out[oo] = c * x + s * y;
  out[oo + 1] = c * y - s * x;
}

function setAngles(chain: Chain, pose: Numbers, scratch: PoseScratch): void {
  for (let i = 0; i < chain.n; i++) {
    scratch.cos[i] = Math.cos(pose[i]!);
    scratch.sin[i] = Math.sin(pose[i]!);
  }
}

function chaseVector(chain: Chain, base: Numbers, scratch: PoseScratch, out: Flat): void {
  for (let i = 0; i < chain.n; i++) {
    const c = scratch.cos[i]!;
    const s = scratch.sin[i]!;
    if (i === 0) inward(out, 0, chain, 0, c, s, base, 0);
    else inward(out, 3 * i, chain, i, c, s, out, 3 * i - 3);
  }
}

/**
 * Joint loads at rest. `pose` [n] rad; `out` [6n]: joint i's wrench at 6i, canonical housing frame. `tipForce`: overrides the
 * direction of the case's tip force with a unit vector in the base frame (needed for a case of direction `any`, which otherwise
 * adds nothing here).
 */
export function staticLoads(
  chain: Chain,
  load: ChainCase,
  pose: Numbers,
  out: Flat,
  scratch: PoseScratch,
  tipForce: Numbers | null = null,
): void {
  setAngles(chain, pose, scratch);
  chaseVector(chain, chain.gravity, scratch, scratch.gravity);
  const { tmp, gravity } = scratch;
  const { first, mass } = load;
  setTipForce(chain, load, scratch, tipForce);
  for (let i = chain.n - 1; i >= 0; i--) {
    const g = 3 * i;
    const m = mass[i]!;
    const gx = gravity[g]!;
    const gy = gravity[g + 1]!;
    const gz = gravity[g + 2]!;
    const hx = first[g]!;
    const hy = first[g + 1]!;
    const hz = first[g + 2]!;
    tmp[6] = m * gx;
    tmp[7] = m * gy;
    tmp[8] = m * gz;
    tmp[9] = hy * gz - hz * gy;
    tmp[10] = hz * gx - hx * gz;
    tmp[11] = hx * gy - hy * gx;
    gatherAndTurn(chain, i, out, scratch);
  }
}

/** Leaves the tip force in the last link's frame at tmp[18..20] (zero where there is none). */
function setTipForce(chain: Chain, load: ChainCase, scratch: PoseScratch, tipForce: Numbers | null): void {
  const { tmp, force } = scratch;
  const last = 3 * (chain.n - 1);
  tmp[18] = 0;
  tmp[19] = 0;
  tmp[20] = 0;
  const base = tipForce ?? (load.force === 'base' ? load.forceUnit : null);
  if (load.force === 'none' || (load.force === 'any' && !tipForce)) return;
  if (base) chaseVector(chain, base, scratch, force);
  for (let k = 0; k < 3; k++) tmp[18 + k] = load.magnitude * (base ? force[last + k]! : load.forceUnit[k]!);
}

/**
 * Adds to link i's own wrench (tmp[6..11], link frame) what stands outboard, turns the sum into housing frame i and stores it.
 * For the last link the outboard part is the tip force.
 */
function gatherAndTurn(chain: Chain, i: number, out: Flat, scratch: PoseScratch): void {
  const { tmp } = scratch;
  let arm = chain.tipOrigin as Numbers;
  let at = 0;
  if (i === chain.n - 1) {
    tmp[12] = tmp[18]!;
    tmp[13] = tmp[19]!;
    tmp[14] = tmp[20]!;
  } else {
    const o = WRENCH * (i + 1);
    rotate3(tmp, 12, chain.rotation, 9 * (i + 1), out, o);
    rotate3(tmp, 15, chain.rotation, 9 * (i + 1), out, o + 3);
    arm = chain.origin;
    at = 3 * (i + 1);
    tmp[9]! += tmp[15]!;
    tmp[10]! += tmp[16]!;
    tmp[11]! += tmp[17]!;
  }
  const fx = tmp[12]!;
  const fy = tmp[13]!;
  const fz = tmp[14]!;
  const px = arm[at]!;
  const py = arm[at + 1]!;
  const pz = arm[at + 2]!;
  const wx = tmp[6]! + fx;
  const wy = tmp[7]! + fy;
  const mx = tmp[9]! + (py * fz - pz * fy);
  const my = tmp[10]! + (pz * fx - px * fz);
  const c = scratch.cos[i]!;
  const s = scratch.sin[i]!;
  const o = WRENCH * i;
  out[o] = c * wx - s * wy;
  out[o + 1] = s * wx + c * wy;
  out[o + 2] = tmp[8]! + fz;
  out[o + 3] = c * mx - s * my;
  out[o + 4] = s * mx + c * my;
  out[o + 5] = tmp[11]! + (px * fy - py * fx);
}

/**
 * Joint loads in motion: as `staticLoads`, with the joints at the given rates. A load in motion is weight and tip force less
 * mass times acceleration. With zero rates it equals `staticLoads` (tested).
 */
export function dynamicLoads(
  chain: Chain,
  load: ChainCase,
  pose: Numbers,
  rates: Rates,
  out: Flat,
  scratch: PoseScratch,
  tipForce: Numbers | null = null,
): void {
  setAngles(chain, pose, scratch);
  forwardRates(chain, rates, scratch);
  setTipForce(chain, load, scratch, tipForce);
  const { tmp, omega, alpha, accel } = scratch;
  for (let i = chain.n - 1; i >= 0; i--) {
    const k = 3 * i;
    const mass = load.mass[i]!;
    const [hx, hy, hz] = [load.first[k]!, load.first[k + 1]!, load.first[k + 2]!];
    const [ox, oy, oz] = [omega[k]!, omega[k + 1]!, omega[k + 2]!];
    const [bx, by, bz] = [alpha[k]!, alpha[k + 1]!, alpha[k + 2]!];
    const [ax, ay, az] = [accel[k]!, accel[k + 1]!, accel[k + 2]!];
    // ω × h, then the force of the moving mass: M a + α × h + ω × (ω × h)
    const cx = oy * hz - oz * hy;
    const cy = oz * hx - ox * hz;
    const cz = ox * hy - oy * hx;
    tmp[6] = -(mass * ax + by * hz - bz * hy + oy * cz - oz * cy);
    tmp[7] = -(mass * ay + bz * hx - bx * hz + oz * cx - ox * cz);
    tmp[8] = -(mass * az + bx * hy - by * hx + ox * cy - oy * cx);
    const I = load.inertia;
    const at = INERTIA.stride * i;
    const xx = I[at + INERTIA.xx]!;
    const yy = I[at + INERTIA.yy]!;
    const zz = I[at + INERTIA.zz]!;
    const xy = I[at + INERTIA.xy]!;
    const xz = I[at + INERTIA.xz]!;
    const yz = I[at + INERTIA.yz]!;
    const lx = xx * ox + xy * oy + xz * oz;
    const ly = xy * ox + yy * oy + yz * oz;
    const lz = xz * ox + yz * oy + zz * oz;
    tmp[9] = -(hy * az - hz * ay + xx * bx + xy * by + xz * bz + oy * lz - oz * ly);
    tmp[10] = -(hz * ax - hx * az + xy * bx + yy * by + yz * bz + oz * lx - ox * lz);
    tmp[11] = -(hx * ay - hy * ax + xz * bx + yz * by + zz * bz + ox * ly - oy * lx);
    gatherAndTurn(chain, i, out, scratch);
  }
}

/** Fills omega, alpha and accel of every link; the base is accelerated by -g, so weight needs no other place. */
function forwardRates(chain: Chain, rates: Rates, scratch: PoseScratch): void {
  const { omega, alpha, accel, tmp, cos, sin } = scratch;
  for (let i = 0; i < chain.n; i++) {
    const prev = 3 * (i - 1);
    const at = 3 * i;
    if (i === 0) {
      for (let k = 0; k < 6; k++) tmp[k] = 0;
      for (let k = 0; k < 3; k++) tmp[6 + k] = -chain.gravity[k]!;
    } else {
      const [ox, oy, oz] = [omega[prev]!, omega[prev + 1]!, omega[prev + 2]!];
      const [bx, by, bz] = [alpha[prev]!, alpha[prev + 1]!, alpha[prev + 2]!];
      const [px, py, pz] = [chain.origin[at]!, chain.origin[at + 1]!, chain.origin[at + 2]!];
      const cx = oy * pz - oz * py;
      const cy = oz * px - ox * pz;
      const cz = ox * py - oy * px;
      tmp[0] = ox;
      tmp[1] = oy;
      tmp[2] = oz;
      tmp[3] = bx;
      tmp[4] = by;
      tmp[5] = bz;
      tmp[6] = accel[prev]! + by * pz - bz * py + oy * cz - oz * cy;
      tmp[7] = accel[prev + 1]! + bz * px - bx * pz + oz * cx - ox * cz;
      tmp[8] = accel[prev + 2]! + bx * py - by * px + ox * cy - oy * cx;
    }
    rotateBack3(omega, at, chain.rotation, 9 * i, tmp, 0);
    rotateBack3(alpha, at, chain.rotation, 9 * i, tmp, 3);
    rotateBack3(accel, at, chain.rotation, 9 * i, tmp, 6);
    const rate = rates.speed[i]!;
    // ω × z q̇ in the housing frame, before q̇ is added to ω
    alpha[at]! += omega[at + 1]! * rate;
    alpha[at + 1]! -= omega[at]! * rate;
    alpha[at + 2]! += rates.accel[i]!;
    omega[at + 2]! += rate;
    const c = cos[i]!;
    const s = sin[i]!;
    turnBackZ(omega, at, c, s);
    turnBackZ(alpha, at, c, s);
    turnBackZ(accel, at, c, s);
  }
}

function turnBackZ(v: Flat, at: number, c: number, s: number): void {
  const x = v[at]!;
  const y = v[at + 1]!;
  v[at] = c * x + s * y;
  v[at + 1] = c * y - s * x;
}

/** Position of the tip origin from each joint origin, canonical housing frame, m. `out` [3n]. */
export function tipReach(chain: Chain, pose: Numbers, out: Flat, scratch: PoseScratch): void {
  const { tmp } = scratch;
  for (let i = chain.n - 1; i >= 0; i--) {
    if (i === chain.n - 1) for (let k = 0; k < 3; k++) tmp[k] = chain.tipOrigin[k]!;
    else {
      rotate3(tmp, 0, chain.rotation, 9 * (i + 1), out, 3 * (i + 1));
      for (let k = 0; k < 3; k++) tmp[k]! += chain.origin[3 * (i + 1) + k]!;
    }
    const c = Math.cos(pose[i]!);
    const s = Math.sin(pose[i]!);
    out[3 * i] = c * tmp[0]! - s * tmp[1]!;
    out[3 * i + 1] = s * tmp[0]! + c * tmp[1]!;
    out[3 * i + 2] = tmp[2]!;
  }
}

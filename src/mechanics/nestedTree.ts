/**
 * What the joints from i outward can make of Y in the housing frame of joint i, as a tree: level ℓ holds, for every choice of the
 * first ℓ + 1 turns, the centre of the ball of what the turns still open can make of it. The last turn is no level: it is a row, Y
 * affine in its cosine and sine. Made once, however many gravity directions meet it. The first levels are tabulated; below them `step`
 * makes one node from its parent, and `row` its row.
 */
import { multiply33, rotate3 } from '../math/vector.ts';
import type { Chain } from './chain.ts';
import type { RowSamples } from './harmonicRow.ts';
import type { NestedBalls } from './nestedBalls.ts';
import type { NestedCase } from './nestedCase.ts';
import type { Stage } from './nestedStages.ts';

/** Most nodes of the last tabulated level, and how many a direction that meets the tree is worth. */
const MOST_NODES = 4096;
const NODES_A_DIRECTION = 16;

/** A node in the making: rotation to housing frame i [9], where the turns made stand there [3], Y so far [width]. */
const AT = { rotation: 0, reach: 9, sum: 12 } as const;

/** Arrays that one joint's trees take over from one another, box after box. What they hold is written anew. */
export class TreeMemory {
  private readonly held = new Map<string, Float64Array>();

  /** At least `size` numbers. */
  take(name: string, size: number): Float64Array {
    const known = this.held.get(name);
    if (known && known.length >= size) return known;
    const made = new Float64Array(size);
    this.held.set(name, made);
    return made;
  }
}

export class NestedTree {
  /** Levels above the row; how many of them are tabulated. */
  readonly levels: number;
  readonly tabulated: number;
  /** Turns at each level. */
  readonly turns: Int32Array;
  readonly samples: RowSamples;
  /** Per tabulated level: centres [width nodes] and indices from the box's first pose [nodes]. */
  readonly centre: Float64Array[] = [];
  readonly offset: Float64Array[] = [];
  /** Radii of the balls of each level's nodes, one array a level. [blocks] */
  readonly radius: Float64Array[] = [];
  /** Ball of all that the tree can make. [width], [blocks] */
  readonly rootCentre: Float64Array;
  readonly rootRadius: Float64Array;
  /** Rows of the last level's nodes (of the root where there is no level), where all levels are tabulated. [3 width nodes] */
  readonly rows: Float64Array | null;
  /** Size of a node in the making, and those of the last tabulated level. */
  readonly frameSize: number;
  frames: Float64Array;
  private readonly chain: Chain;
  private readonly load: NestedCase;
  private readonly stages: readonly Stage[];
  private readonly balls: NestedBalls;
  private readonly start: number;
  private readonly memory: TreeMemory;
  private readonly turned = new Float64Array(9);
  private readonly tmp = new Float64Array(6);

  /**
   * Tree of the joint whose first stage is `start`; `directions`: how many inboard choices will meet it. The trees that used `memory`
   * before are of no more use.
   */
  constructor(
    chain: Chain,
    load: NestedCase,
    stages: readonly Stage[],
    balls: NestedBalls,
    start: number,
    directions: number,
    memory: TreeMemory,
  ) {
    this.chain = chain;
    this.load = load;
    this.stages = stages;
    this.balls = balls;
    this.start = start;
    this.memory = memory;
    this.levels = stages.length - start - 1;
    const { blocks, width } = load;
    this.rootCentre = balls.outCentre.slice(width * start, width * (start + 1));
    this.rootRadius = balls.outRadius.slice(blocks * start, blocks * (start + 1));
    this.turns = balls.outTurns.slice(start);
    this.frameSize = 12 + load.width;
    this.frames = new Float64Array(this.frameSize);
    this.frames.set([1, 0, 0, 0, 1, 0, 0, 0, 1]);
    const end = stages[stages.length - 1]!;
    const turns = balls.outTurns[stages.length - 1]!;
    this.samples = { turns, cos: end.cos, sin: end.sin, offset: end.offset };
    for (let level = 0; level < this.levels; level++) this.radius.push(this.levelRadius(level));
    const most = Math.min(MOST_NODES, NODES_A_DIRECTION * directions);
    let nodes = 1;
    let level = 0;
    while (level < this.levels && (level === 0 || nodes * this.turns[level]! <= most)) {
      this.tabulate(level, nodes);
      nodes *= this.turns[level]!;
      level++;
    }
    this.tabulated = level;
    this.rows = level === this.levels ? this.tabulateRows(nodes) : null;
  }

  private tabulateRows(nodes: number): Float64Array {
    const size = 3 * this.load.width;
    const rows = this.memory.take('rows', size * nodes);
    for (let e = 0; e < nodes; e++) this.row(this.frames, this.frameSize * e, rows, size * e);
    return rows;
  }

  /** The row of the last turn at the node in the making `from`: Y is out + out' cos q + out'' sin q, one after another. */
  row(from: Float64Array, fromAt: number, out: Float64Array, at: number): void {
    const { load, tmp } = this;
    const { blocks, width, own } = load;
    const o = width * (load.n - 1);
    for (let k = 0; k < width; k++) out[at + k] = from[fromAt + AT.sum + k]!;
    out.fill(0, at + width, at + 3 * width);
    for (let b = 0; b < blocks; b++) {
      const x = own[o + 3 * b]!;
      const y = own[o + 3 * b + 1]!;
      const z = own[o + 3 * b + 2]!;
      for (let part = 0; part < 3; part++) {
        // Rz(q) (x, y, z) = (0, 0, z) + cos q (x, y, 0) + sin q (-y, x, 0)
        const px = part === 0 ? 0 : part === 1 ? x : -y;
        const py = part === 0 ? 0 : part === 1 ? y : x;
        const pz = part === 0 ? z : 0;
        for (let r = 0; r < 3; r++) {
          const f = fromAt + 3 * r;
          tmp[r] = from[f]! * px + from[f + 1]! * py + from[f + 2]! * pz;
        }
        const to = at + part * width + 3 * b;
        for (let r = 0; r < 3; r++) out[to + r]! += tmp[r]!;
        if (load.tool && b === blocks - 2) this.addLever(from, fromAt, out, to + 3);
      }
    }
  }

  /** Y of sample k of a row into `out` [width]. */
  sample(row: Float64Array, at: number, k: number, out: Float64Array): void {
    const { width } = this.load;
    const cos = this.samples.cos[k]!;
    const sin = this.samples.sin[k]!;
    for (let r = 0; r < width; r++) out[r] = row[at + r]! + cos * row[at + width + r]! + sin * row[at + 2 * width + r]!;
  }

  /** out += reach of the node × tmp[0..2]. */
  private addLever(node: Float64Array, nodeAt: number, out: Float64Array, at: number): void {
    const { tmp } = this;
    const px = node[nodeAt + AT.reach]!;
    const py = node[nodeAt + AT.reach + 1]!;
    const pz = node[nodeAt + AT.reach + 2]!;
    out[at]! += py * tmp[2]! - pz * tmp[1]!;
    out[at + 1]! += pz * tmp[0]! - px * tmp[2]!;
    out[at + 2]! += px * tmp[1]! - py * tmp[0]!;
  }

  private levelRadius(level: number): Float64Array {
    const { balls, load, stages, start } = this;
    const { blocks } = load;
    const out = new Float64Array(blocks);
    const next = start + level + 1;
    for (let b = 0; b < blocks; b++) out[b] = balls.outRadius[blocks * next + b]!;
    if (!load.tool) return out;
    let reach = 0;
    for (let s = start; s < next; s++) {
      const j = 3 * stages[s]!.joint;
      if (stages[s]!.last) reach += Math.hypot(load.lever[j]!, load.lever[j + 1]!, load.lever[j + 2]!);
    }
    out[blocks - 1]! += reach * out[blocks - 2]!;
    return out;
  }

  private tabulate(level: number, parents: number): void {
    const { load, frameSize, stages, start, memory } = this;
    const turns = this.turns[level]!;
    const nodes = parents * turns;
    const before = this.frames;
    const offsets = level === 0 ? null : this.offset[level - 1]!;
    const frames = memory.take(`frames ${level}`, frameSize * nodes);
    const centre = memory.take(`centre ${level}`, load.width * nodes);
    const offset = memory.take(`offset ${level}`, nodes);
    const stage = stages[start + level]!;
    for (let p = 0; p < parents; p++) {
      for (let k = 0; k < turns; k++) {
        const e = p * turns + k;
        this.step(level, k, before, frameSize * p, frames, frameSize * e, centre, load.width * e);
        offset[e] = (offsets ? offsets[p]! : 0) + stage.offset[k]!;
      }
    }
    this.frames = frames;
    this.centre.push(centre);
    this.offset.push(offset);
  }

  /** What each turn of a level adds to the index. */
  stepOffset(level: number): Float64Array {
    return this.stages[this.start + level]!.offset;
  }

  /** Makes the node of turn k below `from`: the node in the making at `to`, its centre at `at`. */
  step(
    level: number,
    k: number,
    from: Float64Array,
    fromAt: number,
    to: Float64Array,
    toAt: number,
    centre: Float64Array,
    at: number,
  ): void {
    const { chain, load, balls, turned, tmp } = this;
    const { width, own, lever } = load;
    const s = this.start + level;
    const stage = this.stages[s]!;
    const cos = stage.cos[k]!;
    const sin = stage.sin[k]!;
    for (let r = 0; r < 9; r += 3) {
      const x = from[fromAt + r]!;
      const y = from[fromAt + r + 1]!;
      turned[r] = cos * x + sin * y;
      turned[r + 1] = cos * y - sin * x;
      turned[r + 2] = from[fromAt + r + 2]!;
    }
    for (let r = 9; r < this.frameSize; r++) to[toAt + r] = from[fromAt + r]!;
    if (stage.last) {
      const j = stage.joint;
      this.add(turned, 0, own, width * j, to, toAt, to, toAt + AT.sum);
      rotate3(tmp, 0, turned, 0, lever, 3 * j);
      for (let r = 0; r < 3; r++) to[toAt + AT.reach + r]! += tmp[r]!;
      multiply33(to, toAt, turned, 0, chain.rotation, 9 * (j + 1));
    } else {
      for (let r = 0; r < 9; r++) to[toAt + r] = turned[r]!;
    }
    for (let r = 0; r < width; r++) centre[at + r] = to[toAt + AT.sum + r]!;
    this.add(to, toAt, balls.outCentre, width * (s + 1), to, toAt, centre, at);
  }

  /** out += Y of the frame `rotation` (standing at the reach of `node`), in housing frame i. */
  private add(
    rotation: Float64Array,
    rotationAt: number,
    Y: Float64Array,
    yAt: number,
    node: Float64Array,
    nodeAt: number,
    out: Float64Array,
    at: number,
  ): void {
    const { load, tmp } = this;
    const { blocks } = load;
    for (let b = 0; b < blocks; b++) {
      rotate3(tmp, 0, rotation, rotationAt, Y, yAt + 3 * b);
      for (let r = 0; r < 3; r++) out[at + 3 * b + r]! += tmp[r]!;
      if (load.tool && b === blocks - 2) this.addLever(node, nodeAt, out, at + 3 * b + 3);
    }
  }
}

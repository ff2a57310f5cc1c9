/**
 * The certified worst of one check in one case by best-first branch and bound over boxes of joint angles, for every kind of load that
 * leaves nothing moving: a bound that nothing within the travel exceeds, and an attained value with its pose. Boxes are bounded by
 * `branchBoundBox.ts`; those that cannot hold the worst (the check rises right through them) are dropped or shrunk by `branchBoundShrink.ts`.
 */

import { BoxSearch, type BoxSearchOptions } from './boxSearch.ts';
import { BoxBound } from './branchBoundBox.ts';
import { formsAt } from './branchBoundForms.ts';
import { InboardDirections } from './branchBoundInboard.ts';
import { shrinkBox } from './branchBoundShrink.ts';
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm, Form } from './form.ts';
import { COARSE_CELLS, TOP_LEVEL } from './outwardSets.ts';
import { Polish } from './polish.ts';
import { allRound, FAR, sameAllRound } from './roundForms.ts';

export interface BranchBoundOptions extends BoxSearchOptions {
  /** Directions of gravity at a joint (in its link's frame or its housing's), to share between checks. */
  readonly inboard?: (joint: number, inLink: boolean) => InboardDirections;
}

const FEW = 1 << 21;
/** Share of the gap that forms all round may lie above what is attained. */
const NEAR = 0.6;
const RANDOM_POSES = 64;
const CLIMBS = 3;

export class BranchBound extends BoxSearch<BoxBound> {
  private readonly joint: number;
  private readonly inLink: boolean;
  private readonly finest: number;
  private readonly inboard: InboardDirections | null;

  constructor(chain: Chain, load: ChainCase, check: CheckForm, options: BranchBoundOptions) {
    super(chain, load, check, options.gap);
    this.joint = check.joint;
    for (const seed of options.seeds ?? []) this.offer(seed);
    this.firstPoses(RANDOM_POSES, CLIMBS, this.climber);
    const forms = this.formsFor(check);
    // A form that is the same all round the axis may be read in the link's frame, where joint i turns gravity alone
    this.inLink = load.force !== 'base' && forms.every(sameAllRound);
    const makeDirections = (joint: number, inLink: boolean) => new InboardDirections(chain, joint, inLink);
    this.inboard = load.force === 'base' ? null : (options.inboard ?? makeDirections)(check.joint, this.inLink);
    // Cells so fine that what all inboard steps overshoot is a tenth of the gap asked for.
    const cell = Math.sqrt((0.8 * options.gap) / Math.max(1, this.inboard?.count ?? 1));
    const fine = Math.max(0, Math.min(TOP_LEVEL, Math.ceil(Math.log2(2 / (COARSE_CELLS * cell)))));
    // one joint's arc is in closed form
    this.finest = (this.inboard?.count ?? 0) < 2 ? 0 : fine;
    this.lay(forms, (f) => new BoxBound(chain, load, check.joint, f, this.inboard), options.most ?? FEW);
    this.begin(check);
  }

  /** The check's forms, or forms of the same value all round that bound them where those come near enough: they need no angle of the joint. */
  private formsFor(check: CheckForm): readonly Form[] {
    const { chain, load } = this;
    const forms = formsAt(chain, load, check.joint, check.forms);
    const far = chain.to[check.joint]! - chain.from[check.joint]! >= FAR;
    if (load.force === 'base' || !far || forms.every(sameAllRound)) return forms;
    const round = allRound(forms);
    if (!round) return forms;
    const most = new Polish(chain, load, { ...check, forms: round }).climb(Float64Array.from(this.pose));
    return most <= this.found * (1 + NEAR * this.gap) ? round : forms;
  }

  protected firstBoxes(): void {
    const { low, high, pieces, joint } = this;
    pieces.forEach((piece, index) => {
      const { rows, P } = piece.form;
      const directions: [number, number, number, number][] = [];
      if (rows === 1) {
        directions.push([0, 0, 0, 0]);
        if (P.some((v) => v !== 0) || piece.form.c[0] !== 0) directions.push([Math.PI, Math.PI, 0, 0]);
      } else {
        const tilt = rows === 3 ? Math.PI / 2 : 0;
        for (let k = 0; k < 4; k++) directions.push([(k / 2 - 1) * Math.PI, ((k + 1) / 2 - 1) * Math.PI, -tilt, tilt]);
      }
      for (const [a, b, c, d] of directions) {
        this.setArc(a, b, c, d);
        if (this.inLink) {
          low[joint] = 0;
          high[joint] = 0;
        }
        this.assess(index, Number.POSITIVE_INFINITY);
      }
    });
  }

  /**
   * Bounds the box in `low`, `high`, a part of one of bound `ceiling`, shrinks it while that helps, and keeps it where it may hold the
   * worst.
   */
  protected assess(index: number, ceiling: number): void {
    const { low, high, chain, queue } = this;
    const piece = this.pieces[index]!;
    const { box } = piece;
    let bound = ceiling;
    for (let turn = 0; turn < 8; turn++) {
      this.boxes++;
      box.level = 0;
      bound = Math.min(bound, box.bound(low, high, 0));
      while (bound > this.enough() && box.level < this.finest) {
        // finer tables where they can close the box
        if (bound - 1.5 * box.overshoot(this.trial) > this.enough()) break;
        box.level++;
        this.boxes++;
        bound = Math.min(bound, box.bound(low, high, 0));
      }
      if (bound <= this.found) return;
      if (piece.torque && !this.torqueCanBe(piece)) return;
      if (box.value > this.found) this.tryMiddle(box);
      if (bound <= this.enough()) {
        if (bound > this.closed) this.closed = bound;
        return;
      }
      const share = shrinkBox(box, chain, low, high);
      if (share < 0) return;
      if (share > 0.8) break;
    }
    let at = -1;
    let most = 0;
    for (let k = 0; k < box.size; k++) {
      if (!(high[k]! > low[k]!)) continue;
      if (!(box.cost[k]! > most)) continue;
      most = box.cost[k]!;
      at = k;
    }
    if (at < 0 || high[at]! - low[at]! < 1e-9) {
      // no cut can help: the finest tables, and that is what can be said
      box.level = this.finest;
      this.boxes++;
      this.closed = Math.max(this.closed, Math.min(bound, box.bound(low, high, 0)));
      return;
    }
    queue.push(bound, low, high, at, index);
  }

  private tryMiddle(box: BoxBound): void {
    this.setMiddle();
    this.inboard?.follow(box.lever.at, this.trial, 1);
    this.tryTrial();
  }

  protected torqueBound(torque: BoxBound): number {
    torque.level = 1;
    return torque.bound(this.low, this.high, 0);
  }
}

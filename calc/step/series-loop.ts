import { PIECE, type CompiledCurve } from '../curve/compiled-curve';
import { socAtVolts } from '../curve/ocv';
import { mergeAlike, type Branch, type LoopPart, type Sense } from './branches';

/**
 * Groups in series through one current, made ready for integration.
 *
 * One current moves every group by the same charge, so the whole state is the charge q that has passed (coulombs) and,
 * for each distinct time constant, the summed over-voltage of the RC branches. Equal groups are taken together.
 * Over-voltages are counted positive in the direction of the current.
 */
export class SeriesLoop {
  readonly sense: Sense;
  readonly branchOfGroup: number[];
  readonly counts: number[] = [];
  readonly ohmic: number[] = [];
  readonly startSoc: number[] = [];
  readonly socPerCoulomb: number[] = [];
  readonly curves: CompiledCurve[] = [];
  readonly parts: LoopPart[] = [];
  /** Time constant, summed R1 and summed starting over-voltage of each class. */
  readonly classTau: number[] = [];
  readonly classOhm: number[] = [];
  readonly classStart: number[] = [];
  readonly classOf: number[] = [];
  /** Over-voltage of one group of the branch = share · class sum + residual · e^(−t/τ). */
  readonly share: number[] = [];
  readonly residual: number[] = [];
  /** Some residual is not zero: single groups do not follow their class sum. */
  readonly uneven: boolean;
  readonly totalOhmic: number;

  /** Summed rest voltage and its slope to the charge, V and V per coulomb, as of the last `at`. */
  emf = 0;
  emfSlope = 0;

  private lastQ = NaN;

  private readonly weights: number[] = [];
  private readonly slopeWeights: number[] = [];
  private readonly pieces: Int32Array;

  constructor(parts: LoopPart[]) {
    this.sense = parts[0]!.sense;
    const { branches, branchOfGroup } = mergeAlike(parts);
    this.branchOfGroup = branchOfGroup;
    for (const branch of branches) this.addBranch(branch);
    branches.forEach((branch, b) => {
      const ohm = this.classOhm[this.classOf[b]!]!;
      const own = branch.group.polarisationResistanceOhm;
      this.share.push(ohm > 0 ? own / ohm : 0);
      const start = this.startOver(branch);
      const rest = start - this.share[b]! * this.classStart[this.classOf[b]!]!;
      this.residual.push(Math.abs(rest) < 1e-12 ? 0 : rest);
    });
    this.uneven = this.residual.some((rest) => rest !== 0);
    this.totalOhmic = this.ohmic.reduce((sum, ohm, b) => sum + ohm * this.counts[b]!, 0);
    this.pieces = new Int32Array(branches.length);
  }

  get branchCount(): number {
    return this.counts.length;
  }

  /** Brings `emf` and `emfSlope` to the charge `q`, C. */
  at(q: number): void {
    if (q === this.lastQ) return;
    this.lastQ = q;
    const { curves, pieces, startSoc, socPerCoulomb, weights, slopeWeights } = this;
    let emf = 0;
    let slope = 0;
    for (let b = 0; b < curves.length; b++) {
      const z = startSoc[b]! + socPerCoulomb[b]! * q;
      const curve = curves[b]!;
      const knots = curve.knots;
      // Found from where it was last: charge moves little between two calls.
      let k = pieces[b]!;
      while (k > 0 && z < knots[k - 1]!) k--;
      while (k < knots.length && z >= knots[k]!) k++;
      pieces[b] = k;
      const c = curve.pieces;
      const p = PIECE * k;
      const x = z - c[p]!;
      const c1 = c[p + 2]!;
      const c2 = c[p + 3]!;
      const c3 = c[p + 4]!;
      emf += weights[b]! * (c[p + 1]! + x * (c1 + x * (c2 + x * c3)));
      slope += slopeWeights[b]! * (c1 + x * (2 * c2 + x * 3 * c3));
    }
    this.emf = emf;
    this.emfSlope = slope;
  }

  /** Rest voltage of one group of branch `b` at the charge `q`, V. */
  branchVolts(b: number, q: number): number {
    const z = this.socOf(b, q);
    const p = PIECE * this.locate(b, z);
    const c = this.curves[b]!.pieces;
    const x = z - c[p]!;
    return c[p + 1]! + x * (c[p + 2]! + x * (c[p + 3]! + x * c[p + 4]!));
  }

  /** Its slope to the charge, V per coulomb. */
  branchSlope(b: number, q: number): number {
    const z = this.socOf(b, q);
    const p = PIECE * this.locate(b, z);
    const c = this.curves[b]!.pieces;
    const x = z - c[p]!;
    return this.socPerCoulomb[b]! * (c[p + 2]! + x * (2 * c[p + 3]! + x * 3 * c[p + 4]!));
  }

  socOf(b: number, q: number): number {
    return this.startSoc[b]! + this.socPerCoulomb[b]! * q;
  }

  /** ∫ (summed rest voltage) dq from 0 to `q`, W·s. */
  energyTo(q: number): number {
    let sum = 0;
    for (let b = 0; b < this.counts.length; b++) {
      const from = this.startSoc[b]!;
      const rise = this.areaTo(b, this.socOf(b, q)) - this.areaTo(b, from);
      sum += (this.weights[b]! * rise) / this.socPerCoulomb[b]!;
    }
    return sum;
  }

  /** Over-voltage of one group of branch `b` in the direction of the current, V. */
  branchOver(b: number, y: ArrayLike<number>, afterS: number): number {
    const c = this.classOf[b]!;
    const residual = this.residual[b]!;
    const over = this.share[b]! * y[1 + c]!;
    return residual === 0 ? over : over + residual * Math.exp(-afterS / this.classTau[c]!);
  }

  private areaTo(b: number, z: number): number {
    const p = PIECE * this.locate(b, z);
    const c = this.curves[b]!.pieces;
    const x = z - c[p]!;
    return c[p + 5]! + x * (c[p + 1]! + x * (c[p + 2]! / 2 + x * (c[p + 3]! / 3 + (x * c[p + 4]!) / 4)));
  }

  /** The piece of branch `b` that holds `z`. */
  private locate(b: number, z: number): number {
    const knots = this.curves[b]!.knots;
    let k = this.pieces[b]!;
    while (k > 0 && z < knots[k - 1]!) k--;
    while (k < knots.length && z >= knots[k]!) k++;
    this.pieces[b] = k;
    return k;
  }

  private addBranch({ group, part, curve, count }: Branch): void {
    const perCoulomb = (part.sense * part.efficiency) / (3600 * group.capacityAh);
    this.counts.push(count);
    this.parts.push(part);
    this.curves.push(curve);
    this.ohmic.push(group.ohmicResistanceOhm);
    this.startSoc.push(socAtVolts(part.curve, group.restVolts));
    this.socPerCoulomb.push(perCoulomb);
    this.weights.push(part.side * count);
    this.slopeWeights.push(part.side * count * perCoulomb);
    // A branch that neither gathers nor holds an over-voltage needs no time constant of its own.
    const tau = group.polarisationTimeConstantS > 0 ? group.polarisationTimeConstantS : 1;
    let c = this.classTau.indexOf(tau);
    if (c < 0) {
      c = this.classTau.push(tau) - 1;
      this.classOhm.push(0);
      this.classStart.push(0);
    }
    this.classOf.push(c);
    this.classOhm[c]! += count * group.polarisationResistanceOhm;
    this.classStart[c]! += count * this.startOver({ group, part, curve, count });
  }

  private startOver({ group, part }: Branch): number {
    return part.sense * (group.polarisationVolts ?? 0);
  }
}

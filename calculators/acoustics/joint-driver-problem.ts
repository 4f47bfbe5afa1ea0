import { InputError } from '../../shared/errors.js';
import type {
  FitParameter,
  LeastSquaresProblem,
  NormalSums,
  ResidualBlock,
} from '../numerics/least-squares-problem.js';
import type { Loss } from '../numerics/losses.js';
import { type DriverLoad, FREE_AIR } from './driver-impedance.js';
import type { SuspensionModel } from './suspension.js';
import { type SweepData, SweepTerm } from './sweep-term.js';
import type { CoilModel } from './voice-coil.js';

/** One sweep of a joint fit. Its weights are 1/σ of ln Z, point by point, so that the sweeps weigh against each other. */
export interface JointSweep {
  readonly data: SweepData;
  readonly weights: Float64Array; // (n), 0 = switched off
  /** Known added mass in kg with its standard uncertainty (0: exact). */
  readonly addedMass?: { readonly massKg: number; readonly uncertaintyKg: number };
  /** In a closed box: its terms; `massFree` lets the moving mass differ from that in free air (mu of its own). */
  readonly box?: { readonly kind: Exclude<DriverLoad['box'], 'none'>; readonly massFree: boolean };
  /** True: a DC resistance of its own (a warm coil, a contact), while Bl stays shared. Not for all sweeps: one has the `Re`. */
  readonly ownRe?: boolean;
}

/** What is known beforehand of one parameter: value ± standard uncertainty (of ln value where logScaled). */
export interface PriorKnowledge {
  readonly id: string;
  readonly value: number;
  readonly uncertainty: number; // natural units
}

export interface JointDriverProblem extends LeastSquaresProblem {
  /** Index of a parameter id: `Re fs Qms Qes` …, `Mms`, `mass2`, `Re2`, `alpha2`, `QL2`, `QA2`, `mu2` (number of the sweep from 1). */
  indexOf(id: string): number;
  /** Local parameters of one sweep (order of `driverParameters`) from the joint values: for curves and misfit. */
  localValues(sweep: number, values: ArrayLike<number>): Float64Array;
  readonly terms: readonly SweepTerm[];
  /** Everything known beforehand, uncertain masses included: the last rows of the residual, in this order. */
  readonly priors: readonly PriorKnowledge[];
}

/** One entry of ∂(scaled local)/∂(scaled joint). `massRatio`: the entry is ± mu, since mu = m/Mms is not logarithmic. */
interface Link {
  readonly joint: number;
  readonly factor: number;
  readonly massRatio: boolean;
}

/**
 * One least-squares problem over several sweeps of one driver, in free air, with added masses, in a closed box. Shared:
 * fs, Qms, Qes, coil, suspension, Re (unless `ownRe`), and Mms where a mass is known. A mass with an uncertainty is a
 * parameter with a row of its own, (ln m − ln m0)/(u/m0). With a resistance of its own a sweep's Qes follows
 * Qes·Re_own/Re, since Bl²/(ωs·Mms) is the driver's.
 */
export function jointDriverProblem(
  coil: CoilModel,
  suspension: SuspensionModel,
  sweeps: readonly JointSweep[],
  priors: readonly PriorKnowledge[] = [],
): JointDriverProblem {
  if (sweeps.length === 0) throw new InputError('missing-input', 'A joint fit needs at least one sweep.', 'sweeps');
  if (sweeps.every(({ ownRe }) => ownRe))
    throw new InputError('bad-setting', 'One sweep of a joint fit must have the shared Re.', 'ownRe');
  const terms = sweeps.map(
    (sweep) =>
      new SweepTerm(
        {
          coil,
          suspension,
          load: {
            mass: sweep.addedMass !== undefined || sweep.box?.massFree === true,
            box: sweep.box?.kind ?? FREE_AIR.box,
          },
        },
        sweep.data,
        sweep.weights,
      ),
  );
  const assembly = new Assembly(sweeps, terms, priors);
  return {
    parameters: assembly.parameters,
    residualCount: assembly.rows,
    activeCount: terms.reduce((total, term) => total + term.activeRows, assembly.priors.length),
    blocks: assembly.blocks(),
    residual: (values, out) => assembly.residual(values, out),
    jacobian: (values, out) => assembly.jacobian(values, out),
    normal: (values, loss, out) => assembly.accumulate(values, loss, out),
    indexOf: (id) => assembly.indexOf(id),
    localValues: (sweep, values) => assembly.localValues(sweep, values).slice(),
    terms,
    priors: assembly.priors,
  };
}

class Assembly {
  readonly parameters: FitParameter[] = [];
  readonly priors: PriorKnowledge[];
  readonly rows: number;
  private readonly links: Link[][][]; // [sweep][local]
  private readonly local: Float64Array[];
  private readonly localSums: NormalSums[];
  private readonly fixedMassKg: (number | null)[]; // exact masses enter as numbers

  constructor(
    private readonly sweeps: readonly JointSweep[],
    private readonly terms: readonly SweepTerm[],
    priors: readonly PriorKnowledge[],
  ) {
    this.fixedMassKg = sweeps.map(({ addedMass }) =>
      addedMass && !(addedMass.uncertaintyKg > 0) ? addedMass.massKg : null,
    );
    this.links = terms.map((term, s) => term.parameters.map((parameter) => this.linksOf(parameter, s)));
    this.priors = [...priors];
    sweeps.forEach(({ addedMass }, s) => {
      if (addedMass && addedMass.uncertaintyKg > 0)
        this.priors.push({ id: `mass${s + 1}`, value: addedMass.massKg, uncertainty: addedMass.uncertaintyKg });
    });
    for (const { id } of this.priors) this.indexOf(id);
    this.local = terms.map((term) => new Float64Array(term.parameters.length));
    this.localSums = terms.map(({ parameters: { length: p } }) => ({
      cost: 0,
      gradient: new Float64Array(p),
      hessian: new Float64Array(p * p),
    }));
    this.rows = terms.reduce((total, term) => total + term.rows, this.priors.length);
  }

  indexOf(id: string): number {
    const index = this.parameters.findIndex((parameter) => parameter.id === id);
    if (index < 0) throw new InputError('bad-setting', `This joint fit has no parameter ${id}.`, id);
    return index;
  }

  blocks(): ResidualBlock[] {
    const blocks: ResidualBlock[] = this.terms.map(({ rows, groupSize }) => ({ rows, groupSize, robust: true }));
    if (this.priors.length > 0) blocks.push({ rows: this.priors.length, groupSize: 1, robust: false });
    return blocks;
  }

  /** Index of a joint parameter, declared when it is first met. */
  private declare(id: string, like: Omit<FitParameter, 'id'>): number {
    const known = this.parameters.findIndex((parameter) => parameter.id === id);
    return known >= 0 ? known : this.parameters.push({ ...like, id }) - 1;
  }

  private linksOf(parameter: FitParameter, s: number): Link[] {
    const { addedMass, ownRe } = this.sweeps[s]!;
    const plain = (joint: number, factor = 1): Link => ({ joint, factor, massRatio: false });
    const { id } = parameter;
    if (id === 'Re') return [plain(this.declare(ownRe ? `Re${s + 1}` : 'Re', parameter))];
    if (id === 'Qes') {
      const shared = plain(this.declare('Qes', parameter));
      if (!ownRe) return [shared];
      const re = { logScaled: true, lower: 1e-2, upper: 1e4 };
      return [shared, plain(this.declare(`Re${s + 1}`, re)), plain(this.declare('Re', re), -1)];
    }
    if (id === 'mu' && addedMass) {
      const mass = { logScaled: true, lower: 1e-9, upper: 100 };
      const links: Link[] = [{ joint: this.declare('Mms', mass), factor: -1, massRatio: true }];
      if (this.fixedMassKg[s] === null)
        links.push({ joint: this.declare(`mass${s + 1}`, mass), factor: 1, massRatio: true });
      return links;
    }
    if (['mu', 'alpha', 'QL', 'QA'].includes(id)) return [plain(this.declare(`${id}${s + 1}`, parameter))];
    return [plain(this.declare(id, parameter))];
  }

  localValues(s: number, values: ArrayLike<number>): Float64Array {
    const local = this.local[s]!;
    const { addedMass } = this.sweeps[s]!;
    const fixed = this.fixedMassKg[s];
    this.links[s]!.forEach((links, k) => {
      const [first, second, third] = links;
      const value = values[first!.joint]!;
      if (first!.massRatio && addedMass) local[k] = (fixed ?? values[second!.joint]!) / value;
      else if (third)
        local[k] = (value * values[second!.joint]!) / values[third.joint]!; // Qes with an Re of its own
      else local[k] = value;
    });
    return local;
  }

  private slope(s: number, k: number, link: Link): number {
    return link.massRatio ? link.factor * this.local[s]![k]! : link.factor;
  }

  residual(values: Float64Array, out: Float64Array): void {
    let row = 0;
    this.terms.forEach((term, s) => {
      term.residual(this.localValues(s, values), out, row);
      row += term.rows;
    });
    for (const prior of this.priors) out[row++] = this.priorRow(prior, values).residual;
  }

  jacobian(values: Float64Array, out: Float64Array): void {
    out.fill(0);
    let row = 0;
    this.terms.forEach((term, s) => {
      const columns = new Float64Array(term.rows * term.parameters.length);
      term.jacobian(this.localValues(s, values), columns);
      this.links[s]!.forEach((links, k) => {
        for (const link of links) {
          const slope = this.slope(s, k, link);
          const start = link.joint * this.rows + row;
          for (let i = 0; i < term.rows; i++) out[start + i]! += slope * columns[k * term.rows + i]!;
        }
      });
      row += term.rows;
    });
    for (const prior of this.priors)
      out[this.indexOf(prior.id) * this.rows + row++] = this.priorRow(prior, values).slope;
  }

  accumulate(values: Float64Array, loss: Loss, out: NormalSums): void {
    out.cost = 0;
    out.gradient.fill(0);
    out.hessian.fill(0);
    const p = this.parameters.length;
    this.terms.forEach((term, s) => {
      const sums = this.localSums[s]!;
      term.accumulate(this.localValues(s, values), loss, sums);
      out.cost += sums.cost;
      const q = term.parameters.length;
      this.links[s]!.forEach((links, k) => {
        for (const link of links) {
          const slope = this.slope(s, k, link);
          out.gradient[link.joint]! += slope * sums.gradient[k]!;
          for (let l = 0; l < q; l++) {
            const entry = slope * (l <= k ? sums.hessian[k * q + l]! : sums.hessian[l * q + k]!);
            for (const other of this.links[s]![l]!) {
              if (other.joint <= link.joint)
                out.hessian[link.joint * p + other.joint]! += entry * this.slope(s, l, other);
            }
          }
        }
      });
    });
    for (const prior of this.priors) {
      const { residual, slope } = this.priorRow(prior, values);
      const k = this.indexOf(prior.id);
      out.cost += 0.5 * residual * residual;
      out.gradient[k]! += slope * residual;
      out.hessian[k * p + k]! += slope * slope;
    }
  }

  private priorRow({ id, value, uncertainty }: PriorKnowledge, values: ArrayLike<number>) {
    const k = this.indexOf(id);
    if (!this.parameters[k]!.logScaled) return { residual: (values[k]! - value) / uncertainty, slope: 1 / uncertainty };
    const relative = uncertainty / value;
    return { residual: Math.log(values[k]! / value) / relative, slope: 1 / relative };
  }
}

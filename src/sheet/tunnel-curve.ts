/** Current density over local bias as a table that Newton's method can walk along without surprises. */
import { Problem } from '../problems/problem.ts';

/** Segments between 0 V and the device bias. */
const segments = 2048;
/** A relative fall between neighbours up to this is taken for the model's rounding and levelled out. */
const roundingFall = 1e-6;

/**
 * J(V)/J(device bias) over 0 … device bias. Between samples J follows a power of V, which is exact
 * for an ohmic element and good to h²/(8·V·n) for an exponential one of slope n; the first segment
 * and segments that start at zero are straight lines. Below 0 V the first segment is prolonged,
 * above the device bias the last tangent: the answer never lies there, but a step of Newton's
 * method may, and a straight line brings it back without overflow.
 *
 * `at(v)` leaves its answer in `density` and `slope` (per volt), so that hot loops allocate nothing.
 */
export class TunnelCurve {
  density = 0;
  slope = 0;
  readonly biasV: number;
  private readonly stepV: number;
  private readonly values = new Float64Array(segments + 1);
  private readonly powers = new Float64Array(segments);
  private readonly endSlope: number;

  /**
   * @param density A/m² at a bias in volts (0 … `biasV`); must be finite, not negative, and must not fall as the bias rises.
   * @param biasV Magnitude of the device bias, above 0.
   * @throws Problem `sheet-density` where the density breaks these rules or is zero at the device bias.
   */
  constructor(density: (biasV: number) => number, biasV: number) {
    this.biasV = biasV;
    this.stepV = biasV / segments;
    const full = density(biasV);
    if (!(full > 0) || !Number.isFinite(full)) throw refusal(biasV, full, 'is not above zero');
    const { values, powers } = this;
    for (let k = 0; k <= segments; k++) {
      const v = k === segments ? biasV : k * this.stepV;
      const value = k === segments ? full : density(v);
      if (!Number.isFinite(value) || value < 0) throw refusal(v, value, 'is not a density');
      const before = k === 0 ? 0 : values[k - 1]!;
      if (value / full < before * (1 - roundingFall)) throw refusal(v, value, 'falls as the bias rises');
      values[k] = Math.max(value / full, before);
      if (k > 1 && before > 0) powers[k - 1] = Math.log(values[k]! / before) / Math.log(k / (k - 1));
    }
    this.endSlope = (powers[segments - 1]! * values[segments]!) / biasV;
  }

  /** Evaluates the curve at local bias `v` in volts. */
  at(v: number): void {
    const place = v / this.stepV;
    if (place >= segments) {
      this.slope = this.endSlope;
      this.density = this.values[segments]! + this.endSlope * (v - this.biasV);
      return;
    }
    const k = place > 0 ? Math.floor(place) : 0;
    const low = this.values[k]!;
    if (k === 0 || low === 0) {
      this.slope = (this.values[k + 1]! - low) / this.stepV;
      this.density = low + this.slope * (v - k * this.stepV);
      return;
    }
    const power = this.powers[k]!;
    this.density = low * Math.exp(power * Math.log(place / k));
    this.slope = (power * this.density) / v;
  }
}

function refusal(biasV: number, value: number, reason: string): Problem<'sheet-density'> {
  return new Problem('sheet-density', { biasV: biasV.toPrecision(4), value: String(value), reason });
}

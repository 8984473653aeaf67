/**
 * The density a device will carry, with its 95 % interval, from what a probe measured at another
 * bias on the same barrier. All spreads are propagated to first order in ln density and combined
 * in quadrature; the interval is median·exp(±1.96 σ).
 *
 * Spreads taken as independent: ln contact area (its 95 % range ×/÷ √10, one decade in all),
 * barrier height (σ 0.1 eV), ln mass (σ 10 %). The noise of the current is not among them.
 *
 * - Thickness unknown: it is solved from the current, so that height, mass and area change it too.
 *   At the probe's own bias only the area is left.
 * - Thickness known (layers counted): current and area then say something about height and mass.
 *   Their values are moved to the most likely ones given the current (Gauss–Newton steps on prior
 *   plus one observation of ln J with the area's spread), and the interval is that of the Gaussian
 *   conditioned on the observation: var − cov²/(var_probe + σ_area²). A precise area pins the
 *   probe's density; a vague one leaves the prior of height and mass.
 * - Thickness known with an error (`thicknessSdM`, read off a step in height): one more quantity like height and mass.
 * - Thickness known and no current: height and mass (and its error) alone.
 *
 * First order is enough: medians and ends lie within 5 % of the interval's width of a Monte Carlo
 * with the same spreads (tested). With WKB and Fowler–Nordheim, and thickness from the current, the
 * mass drops out: their J depends on m·d² alone.
 */
import { defaultThicknessRange, thicknessFromLnDensity } from './inverse.ts';
import type { ThicknessRange } from './inverse.ts';
import type { BarrierMaterial, TunnelModel } from './tunnel-model.ts';

/** What the probe read on the barrier. */
export interface ProbeReading {
  /** Magnitude of the current, A, above 0. */
  readonly currentA: number;
  readonly biasV: number;
  /** Area the current flows through, m²; the median of its spread. */
  readonly areaM2: number;
}

/** Spreads of what is not known exactly. */
export interface BarrierSpread {
  /** Factor f such that the area lies within ×/÷ f with 95 %. */
  readonly areaFactor95: number;
  /** Standard deviation of the height, eV. */
  readonly heightSdEv: number;
  /** Standard deviation of the mass over the mass. */
  readonly massSdRatio: number;
}

export const defaultSpread: BarrierSpread = { areaFactor95: Math.sqrt(10), heightSdEv: 0.1, massSdRatio: 0.1 };

export interface DensityQuestion {
  readonly model: TunnelModel;
  readonly material: BarrierMaterial;
  readonly deviceBiasV: number;
  /** Known thickness; absent: solved from the probe's reading. */
  readonly thicknessM?: number;
  /** Standard deviation of a known thickness; absent: exact. */
  readonly thicknessSdM?: number;
  /** Absent: only possible with a known thickness. */
  readonly probe?: ProbeReading;
  readonly spread?: BarrierSpread;
  readonly range?: ThicknessRange;
}

export interface DensityInterval {
  /** Density at the device's bias, A/m². */
  readonly medianAPerM2: number;
  readonly low95APerM2: number;
  readonly high95APerM2: number;
  /** Thickness used (moved to agree with the current where it was given with an error), and its standard deviation from area, height and mass (0 when it was given). */
  readonly thicknessM: number;
  readonly thicknessSdM: number;
  /** Height and mass used: those given, or moved to agree with the current at a known thickness. */
  readonly material: BarrierMaterial;
  /** Standard deviation of ln density, and the part each source has in it before conditioning. */
  readonly sdLn: number;
  readonly parts: { readonly area: number; readonly height: number; readonly mass: number };
  /**
   * With thickness and current both given: how many standard deviations the current lies from what
   * model, thickness and area expect. Beyond ±2 they contradict each other.
   */
  readonly surprise?: number;
}

const z95 = 1.959963984540054;

/**
 * Answers the question above. Every number is NaN where the model does not hold or the thickness
 * lies outside `range`. Throws a RangeError when neither thickness nor probe is given.
 */
export function densityInterval(question: DensityQuestion): DensityInterval {
  if (question.thicknessM === undefined) {
    if (question.probe === undefined) throw new RangeError('a density interval needs a thickness or a probe reading');
    return fromCurrent(question, question.probe);
  }
  return fromThickness(question, question.thicknessM);
}

/** Point in the space of the uncertain quantities, in their own standard deviations from the centre. */
function materialAt(material: BarrierMaterial, spread: BarrierSpread, height: number, mass: number): BarrierMaterial {
  return { heightEv: material.heightEv + height * spread.heightSdEv, massRatio: material.massRatio * Math.exp(mass * spread.massSdRatio) };
}

function fromCurrent(question: DensityQuestion, probe: ProbeReading): DensityInterval {
  const { model, material, deviceBiasV } = question;
  const spread = question.spread ?? defaultSpread;
  const range = question.range ?? defaultThicknessRange;
  const areaSd = Math.log(spread.areaFactor95) / z95;
  const lnProbe = Math.log(probe.currentA / probe.areaM2);
  const solve = (area: number, height: number, mass: number): { thicknessM: number; ln: number } => {
    const moved = materialAt(material, spread, height, mass);
    const lnDensity = lnProbe - area * areaSd;
    const thicknessM = thicknessFromLnDensity(model, moved, probe.biasV, lnDensity, range);
    // At the probe's own bias the density is the measured one, whatever the barrier.
    const ln = Math.abs(deviceBiasV) === Math.abs(probe.biasV) ? lnDensity : model.lnDensity({ ...moved, thicknessM }, deviceBiasV);
    return { thicknessM, ln };
  };
  const centre = solve(0, 0, 0);
  const sides = [
    [solve(1, 0, 0), solve(-1, 0, 0)],
    [solve(0, 1, 0), solve(0, -1, 0)],
    [solve(0, 0, 1), solve(0, 0, -1)],
  ] as const;
  const [area, height, mass] = sides.map(([up, down]) => (up.ln - down.ln) / 2) as [number, number, number];
  const thicknessSdM = Math.hypot(...sides.map(([up, down]) => (up.thicknessM - down.thicknessM) / 2));
  return {
    ...interval(centre.ln, Math.hypot(area, height, mass)),
    thicknessM: centre.thicknessM,
    thicknessSdM,
    material,
    parts: { area: Math.abs(area), height: Math.abs(height), mass: Math.abs(mass) },
  };
}

/** Where the uncertain quantities stand, in their own standard deviations from the centre. */
interface Place {
  readonly height: number;
  readonly mass: number;
  readonly thickness: number;
}

function fromThickness(question: DensityQuestion, thicknessM: number): DensityInterval {
  const { model, material, deviceBiasV, probe, thicknessSdM = 0 } = question;
  const spread = question.spread ?? defaultSpread;
  // Thickness moves as a logarithm, so that it stays above 0.
  const thicknessAt = (thickness: number): number => thicknessM * Math.exp((thickness * thicknessSdM) / thicknessM);
  const lnAt = ({ height, mass, thickness }: Place, biasV: number): number =>
    model.lnDensity({ ...materialAt(material, spread, height, mass), thicknessM: thicknessAt(thickness) }, biasV);
  /** Central differences over one standard deviation each way. */
  const slopes = (at: Place, biasV: number): Place => {
    const along = (key: keyof Place): number => (lnAt({ ...at, [key]: at[key] + 1 }, biasV) - lnAt({ ...at, [key]: at[key] - 1 }, biasV)) / 2;
    return { height: along('height'), mass: along('mass'), thickness: thicknessSdM > 0 ? along('thickness') : 0 };
  };
  const product = (a: Place, b: Place): number => a.height * b.height + a.mass * b.mass + a.thickness * b.thickness;

  let at: Place = { height: 0, mass: 0, thickness: 0 };
  let areaSd = 0;
  let surprise: number | undefined;
  if (probe !== undefined) {
    areaSd = Math.log(spread.areaFactor95) / z95;
    const seen = Math.log(probe.currentA / probe.areaM2);
    // Gauss–Newton: most likely height, mass and thickness given the current; six steps settle it to rounding.
    for (let step = 0; step < 6; step++) {
      const by = slopes(at, probe.biasV);
      const variance = product(by, by) + areaSd ** 2;
      const excess = seen - lnAt(at, probe.biasV) + product(by, at);
      if (step === 0) surprise = variance > 0 ? excess / Math.sqrt(variance) : Number.NaN;
      if (variance > 0) at = { height: (by.height * excess) / variance, mass: (by.mass * excess) / variance, thickness: (by.thickness * excess) / variance };
    }
  }
  const device = slopes(at, deviceBiasV);
  let variance = product(device, device);
  let areaPart = 0;
  if (probe !== undefined) {
    const seen = slopes(at, probe.biasV);
    const probeVariance = product(seen, seen) + areaSd ** 2;
    const covariance = product(device, seen);
    if (probeVariance > 0) {
      variance = Math.max(0, variance - covariance ** 2 / probeVariance);
      areaPart = (Math.abs(covariance) / probeVariance) * areaSd;
    }
  }
  return {
    ...interval(lnAt(at, deviceBiasV), Math.sqrt(variance)),
    thicknessM: thicknessAt(at.thickness),
    thicknessSdM,
    material: materialAt(material, spread, at.height, at.mass),
    parts: { area: areaPart, height: Math.abs(device.height), mass: Math.abs(device.mass) },
    ...(surprise === undefined ? {} : { surprise }),
  };
}

function interval(ln: number, sdLn: number): Pick<DensityInterval, 'medianAPerM2' | 'low95APerM2' | 'high95APerM2' | 'sdLn'> {
  return { medianAPerM2: Math.exp(ln), low95APerM2: Math.exp(ln - z95 * sdLn), high95APerM2: Math.exp(ln + z95 * sdLn), sdLn };
}

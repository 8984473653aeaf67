/**
 * Physical constants: exact SI values and CODATA 2022 recommended values
 * (Mohr, Newell, Taylor & Tiesinga, Rev. Mod. Phys. 97, 025002, 2025), and the
 * combinations that tunnelling formulas use with fields in V/nm and heights in eV.
 */

/** Elementary charge, C (exact). */
export const elementaryCharge = 1.602176634e-19;
/** Planck constant, J s (exact). */
export const planck = 6.62607015e-34;
/** Boltzmann constant, J/K (exact). */
export const boltzmann = 1.380649e-23;
/** Electron mass, kg. */
export const electronMass = 9.1093837139e-31;
/** Electric constant, F/m. */
export const electricConstant = 8.8541878188e-12;

const hbar = planck / (2 * Math.PI);

/** √(2 mₑ e)/ħ in nm⁻¹ eV^−1/2: wave number under a barrier of 1 eV. */
export const waveNumberPerRootEv = (Math.sqrt(2 * electronMass * elementaryCharge) / hbar) * 1e-9;
/** First Fowler–Nordheim constant e³/8πh in A eV V⁻². */
export const fowlerNordheimA = elementaryCharge ** 2 / (8 * Math.PI * planck);
/** Second Fowler–Nordheim constant 8π√(2mₑ)/3eh in eV^−3/2 V nm⁻¹. */
export const fowlerNordheimB = (4 / 3) * waveNumberPerRootEv;
/** Image-charge energy e²/4πε₀ per field, in eV² V⁻¹ nm. */
export const imageChargeEv2NmPerV = (elementaryCharge / (4 * Math.PI * electricConstant)) * 1e9;
/** Supply constant 4πmₑe³/h³ in A m⁻² eV⁻². */
export const supplyAPerM2Ev2 = (4 * Math.PI * electronMass * elementaryCharge ** 3) / planck ** 3;
/** Simmons' e²/2πh in A/V (times eV over m² gives A/m²). */
export const simmonsA = elementaryCharge ** 2 / (2 * Math.PI * planck);
/** k/e in eV/K. */
export const boltzmannEvPerK = boltzmann / elementaryCharge;

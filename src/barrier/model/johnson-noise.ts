/** Thermal noise of a current amplifier's feedback resistor (Johnson, Phys. Rev. 32, 97; Nyquist, Phys. Rev. 32, 110, 1928). */
import { boltzmann } from './constants.ts';

/** Rms current in A, √(4kT·B/R), over a noise bandwidth of B Hz. */
export function johnsonNoiseA(resistanceOhm: number, temperatureK: number, noiseBandwidthHz: number): number {
  return Math.sqrt((4 * boltzmann * temperatureK * noiseBandwidthHz) / resistanceOhm);
}

/** Noise bandwidth in Hz of one pole whose response is down 3 dB at `cornerHz`: π/2 times as much. */
export function onePoleNoiseBandwidthHz(cornerHz: number): number {
  return (Math.PI / 2) * cornerHz;
}

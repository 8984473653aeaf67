/** Currents below this many times the detection limit (10σ against 3σ; Currie, Anal. Chem. 40, 586, 1968) are seen but not measured well enough for a ladder. */
export const quantifiedOverFloor = 10 / 3;

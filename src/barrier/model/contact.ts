/** Mechanics of a round tip on a flat: contact size and pull-off force. Forces in N, positive when they press. */

/** Reduced modulus in Pa of two isotropic bodies: 1/E* = (1−ν₁²)/E₁ + (1−ν₂²)/E₂ (Hertz 1881). */
export function reducedModulusPa(modulusPa: number, poisson: number, otherModulusPa: number, otherPoisson: number): number {
  return 1 / ((1 - poisson ** 2) / modulusPa + (1 - otherPoisson ** 2) / otherModulusPa);
}

/** Radius in metres of Hertz's contact, a = (3FR/4E*)^⅓; force N, tip radius m, reduced modulus Pa (Hertz, J. Reine Angew. Math. 92, 156, 1881). */
export function hertzRadiusM(forceN: number, tipRadiusM: number, reducedModulusPa: number): number {
  return Math.cbrt((3 * forceN * tipRadiusM) / (4 * reducedModulusPa));
}

/** Area πa² in m² of Hertz's contact. */
export function hertzAreaM2(forceN: number, tipRadiusM: number, reducedModulusPa: number): number {
  return Math.PI * hertzRadiusM(forceN, tipRadiusM, reducedModulusPa) ** 2;
}

/** Pull-off force 2πRw in N for stiff contacts with long-range adhesion; w in J/m² (Derjaguin, Muller & Toporov, J. Colloid Interface Sci. 53, 314, 1975). */
export function pullOffDmtN(tipRadiusM: number, adhesionJPerM2: number): number {
  return 2 * Math.PI * tipRadiusM * adhesionJPerM2;
}

/** Pull-off force (3/2)πRw in N for soft contacts with short-range adhesion; w in J/m² (Johnson, Kendall & Roberts, Proc. R. Soc. A 324, 301, 1971). */
export function pullOffJkrN(tipRadiusM: number, adhesionJPerM2: number): number {
  return 1.5 * Math.PI * tipRadiusM * adhesionJPerM2;
}

/**
 * Contact radius in metres of Derjaguin, Muller & Toporov (1975, as above): Hertz's under the force plus the
 * adhesion 2πRw. 0 at the pull-off force −2πRw, NaN beyond it, where there is no contact.
 */
export function dmtRadiusM(forceN: number, tipRadiusM: number, reducedModulusPa: number, adhesionJPerM2: number): number {
  const pressed = forceN + pullOffDmtN(tipRadiusM, adhesionJPerM2);
  return pressed >= 0 ? hertzRadiusM(pressed, tipRadiusM, reducedModulusPa) : Number.NaN;
}

/**
 * Contact radius in metres of Johnson, Kendall & Roberts (1971, as above, eq. 20):
 * a³ = (3R/4E*)·[F + 3πRw + √(6πRwF + (3πRw)²)]. At the pull-off force −(3/2)πRw the contact still has
 * a size; NaN beyond it.
 */
export function jkrRadiusM(forceN: number, tipRadiusM: number, reducedModulusPa: number, adhesionJPerM2: number): number {
  const adhesion = 3 * Math.PI * tipRadiusM * adhesionJPerM2;
  const inside = adhesion * (2 * forceN + adhesion);
  if (!(inside >= 0)) return Number.NaN;
  return hertzRadiusM(forceN + adhesion + Math.sqrt(inside), tipRadiusM, reducedModulusPa);
}

/** Area πa² in m² of a contact of radius a. */
export function contactAreaM2(radiusM: number): number {
  return Math.PI * radiusM ** 2;
}

/**
 * Tabor's parameter (R·w²/(E*²·z₀³))^⅓ (D. Tabor, J. Colloid Interface Sci. 58, 2, 1977): below about 0.1
 * the contact is DMT's, above about 5 JKR's, between them neither. z₀ is the distance of atoms at rest,
 * about 0.3 nm.
 */
export function taborParameter(tipRadiusM: number, reducedModulusPa: number, adhesionJPerM2: number, restDistanceM = 0.3e-9): number {
  return Math.cbrt((tipRadiusM * adhesionJPerM2 ** 2) / (reducedModulusPa ** 2 * restDistanceM ** 3));
}

/** Mechanics of a round tip on a flat: contact size and pull-off force. */

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

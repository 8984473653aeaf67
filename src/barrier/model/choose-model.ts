/** The model a recipe or a command line names. */
import { Problem } from '../../problems/problem.ts';
import type { BarrierModelName, BarrierSection } from '../recipe.ts';
import { fowlerNordheimModel } from './fowler-nordheim.ts';
import type { FowlerNordheimOptions } from './fowler-nordheim.ts';
import { simmonsModel } from './simmons.ts';
import type { TunnelModel } from './tunnel-model.ts';
import { wkbModel } from './wkb.ts';

/**
 * The model by name. Throws `Problem('barrier-argument')` when an image charge is asked of a model
 * that has none, or its permittivity is below 1.
 */
export function chooseModel(name: BarrierModelName, options: FowlerNordheimOptions = {}): TunnelModel {
  const { imagePermittivity } = options;
  if (imagePermittivity !== undefined) {
    const value = String(imagePermittivity);
    if (name !== 'fowler-nordheim') {
      throw new Problem('barrier-argument', { name: '--image-permittivity', value, reason: `cannot be used with the model ${name}, which has no image charge; use --model fowler-nordheim or leave it out` });
    }
    if (!(imagePermittivity >= 1 && imagePermittivity < Number.POSITIVE_INFINITY)) {
      throw new Problem('barrier-argument', { name: '--image-permittivity', value, reason: 'must be a relative permittivity of at least 1, for hBN across its layers about 3.4' });
    }
  }
  switch (name) {
    case 'wkb':
      return wkbModel;
    case 'simmons':
      return simmonsModel;
    case 'fowler-nordheim':
      return fowlerNordheimModel(options);
  }
}

/** The model of a recipe's section; an image charge stated for a model without one is left out (`assessBarrier` says so). */
export function modelOfSection({ model, prefactor, imagePermittivity }: Pick<BarrierSection, 'model' | 'prefactor' | 'imagePermittivity'>): TunnelModel {
  return chooseModel(model, { massPrefactor: prefactor, ...(model === 'fowler-nordheim' && imagePermittivity !== undefined ? { imagePermittivity } : {}) });
}

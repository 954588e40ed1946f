import { formatNumber, formatQuantity, type ModelDefinition } from '@nightcone/models';
import type { SweptControl } from './read-form.ts';

/** `Continuum ribbon: dimer lines 10 … 69 in 60`: what varies, before anybody gives the sweep a name. */
export function sweepTitle(model: Pick<ModelDefinition, 'title'>, swept: readonly SweptControl[]): string {
  const parts = swept.map(({ field, values }) => {
    const unit = 'unit' in field ? field.unit : '';
    const name = field.display?.title ?? field.name;
    return `${name} ${formatNumber(values[0] ?? 0)} … ${formatQuantity(values.at(-1) ?? 0, unit)} in ${values.length}`;
  });
  return `${model.title}: ${parts.join(', ')}`;
}

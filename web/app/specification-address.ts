/** What is asked of a cut, as it stands in an address: the check and the fit of one question share it. */
import type { SpecificationInput } from '../../api/contracts/analysis.ts';

export type Question = { cut: string; specification: SpecificationInput };

/** The question of an address; null while something of it is missing. */
export function questionOf(params: URLSearchParams): Question | null {
  const cut = params.get('cut');
  const measure = params.get('measure');
  const axis = params.get('axis');
  const unit = params.get('unit');
  if (!cut || !measure) return null;
  if (axis !== 'since_baseline' && axis !== 'planned_day') return null;
  if (unit !== 'days' && unit !== 'weeks') return null;
  return { cut, specification: { measure, axis, unit, group: params.get('group') === 'yes' } };
}

export function questionQuery({ cut, specification }: Question): string {
  const { measure, axis, unit, group } = specification;
  const params = new URLSearchParams({ cut, measure, axis, unit });
  if (group) params.set('group', 'yes');
  return params.toString();
}

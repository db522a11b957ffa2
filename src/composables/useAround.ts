import { computed, type ComputedRef } from 'vue';
import { firstDay } from '../../shared/planner/presence';
import { useProduction } from '../stores/production';

/** A day of the production, to which days typed without a year are near; today where it has none yet. */
export function useAround(): ComputedRef<string> {
  const production = useProduction();
  const now = new Date();
  const two = (value: number): string => String(value).padStart(2, '0');
  const today = `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
  return computed(() => firstDay(production.file, today));
}

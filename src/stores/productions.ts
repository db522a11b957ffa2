import { defineStore } from 'pinia';
import { shallowRef } from 'vue';
import type { ProductionSummary, StartingPoint } from '../../shared/contracts/api';
import * as api from '../api/productions';
import { useSession } from './session';

/** The productions of whoever is here, and what a new one can begin from. */
export const useProductions = defineStore('productions', () => {
  const session = useSession();
  const list = shallowRef<readonly ProductionSummary[] | null>(null);
  const points = shallowRef<readonly StartingPoint[] | null>(null);

  async function load(): Promise<void> {
    const [, started] = await Promise.all([session.read(), api.listStartingPoints()]);
    points.value = started;
    list.value = session.user ? await api.listProductions() : [];
  }

  async function remove(id: string): Promise<void> {
    await api.removeProduction(id);
    list.value = (list.value ?? []).filter((production) => production.id !== id);
  }

  return { list, points, load, remove };
});

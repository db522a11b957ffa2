import { defineStore } from 'pinia';
import { computed, ref } from 'vue';
import type { SessionResponse } from '../../shared/contracts/api';
import * as api from '../api/session';

/** Who is at the desk. A trial user has no e-mail, and keeps everything by creating an account. */
export const useSession = defineStore('session', () => {
  const answer = ref<SessionResponse | null>(null);
  const user = computed(() => answer.value?.user ?? null);
  const known = computed(() => answer.value !== null);
  const trialAllowed = computed(() => answer.value?.trialAllowed ?? false);

  async function read(): Promise<void> {
    answer.value = await api.readSession();
  }

  /** Somebody to own a new production: whoever is here, or a trial where one may be opened. */
  async function ensureUser(): Promise<boolean> {
    if (!known.value) await read();
    if (!user.value && trialAllowed.value) answer.value = await api.openTrial();
    return user.value !== null;
  }

  async function signIn(email: string, password: string): Promise<void> {
    answer.value = await api.signIn({ email, password });
  }

  async function createAccount(name: string, email: string, password: string): Promise<void> {
    answer.value = await api.createAccount({ name, email, password });
  }

  async function signOut(): Promise<void> {
    await api.signOut();
    await read();
  }

  return { user, known, trialAllowed, read, ensureUser, signIn, createAccount, signOut };
});

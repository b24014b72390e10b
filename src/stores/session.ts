import { defineStore } from 'pinia';
import { computed, shallowRef } from 'vue';
import { may as mayDo, type Capability } from '../../shared/roles.js';
import type { Session } from '../../shared/schemas/session.js';
import * as api from '../api/session.js';
import { ApiError } from '../api/client.js';

/** The server leaves this mark beside a session; without it there is none to ask for. */
function mayHaveSession(): boolean {
  return document.cookie.split('; ').includes('trimwick_present=marker');
}

/** Who is signed in, in which team, with which roles. */
export const useSessionStore = defineStore('session', () => {
  const session = shallowRef<Session | null>(null);
  /** False until the server has said who is signed in. */
  const known = shallowRef(false);
  const roles = computed(() => session.value?.roles ?? []);

  /** Asks the server; a lost connection leaves things as they were and is thrown. */
  async function load(): Promise<void> {
    if (!mayHaveSession()) {
      session.value = null;
      known.value = true;
      return;
    }
    try {
      session.value = await api.fetchSession();
    } catch (error) {
      if (!(error instanceof ApiError) || error.status !== 401) throw error;
      session.value = null;
    }
    known.value = true;
  }

  async function signIn(email: string, password: string): Promise<void> {
    session.value = await api.signIn(email, password);
    known.value = true;
  }

  async function signOut(everywhere = false): Promise<void> {
    await (everywhere ? api.signOutEverywhere() : api.signOut());
    session.value = null;
  }

  async function changeTeam(teamId: string): Promise<void> {
    session.value = await api.changeTeam(teamId);
  }

  /** The session has ended on the server. */
  function end(): void {
    session.value = null;
  }

  const may = (capability: Capability) => mayDo(roles.value, capability);

  return { session, known, roles, load, signIn, signOut, changeTeam, end, may };
});

import { defineStore } from 'pinia';
import { computed, ref } from 'vue';
import type { z } from 'zod';
import { type Session, type SetUpFarm, type SignIn, sessionEndpoints } from '@shared/contracts/session.ts';
import { type Access, type Role, mayUse } from '@shared/permissions.ts';
import { callApi } from '@/api/call-api.ts';

/** Who is signed in on this device, their farm, and what they may use. */
export const useSessionStore = defineStore('session', () => {
  const session = ref<Session | null>(null);

  const user = computed(() => session.value?.user ?? null);
  const farm = computed(() => session.value?.farm ?? null);
  const role = computed<Role | null>(() => user.value?.role ?? null);
  const csrfToken = computed(() => session.value?.csrfToken ?? '');
  const needsSetup = computed(() => session.value?.needsSetup ?? false);
  const demoSignIns = computed(() => session.value?.demoSignIns ?? []);
  const isLoaded = computed(() => session.value !== null);
  /** Days and clock times are shown in the farm's zone, wherever the reader is. */
  const timeZone = computed(() => farm.value?.timeZone ?? 'UTC');
  const currency = computed(() => farm.value?.currency ?? 'EUR');

  function can(access: Access): boolean {
    return mayUse(role.value, access);
  }

  /** Takes over a session that an endpoint answered with. */
  function adopt(answered: Session): void {
    session.value = answered;
  }

  async function load(): Promise<void> {
    adopt(await callApi(sessionEndpoints.show));
  }

  async function signIn(credentials: z.input<typeof SignIn>): Promise<void> {
    adopt(await callApi(sessionEndpoints.signIn, { body: credentials }));
  }

  async function signInAsDemo(email: string): Promise<void> {
    adopt(await callApi(sessionEndpoints.demoSignIn, { body: { email } }));
  }

  async function setUpFarm(farmAndOwner: z.input<typeof SetUpFarm>): Promise<void> {
    adopt(await callApi(sessionEndpoints.setUp, { body: farmAndOwner }));
  }

  async function signOut(): Promise<void> {
    await callApi(sessionEndpoints.signOut);
    await load();
  }

  async function signOutEverywhere(): Promise<void> {
    await callApi(sessionEndpoints.signOutEverywhere);
    await load();
  }

  /** The server says that nobody is signed in any more. */
  function forgetUser(): void {
    if (session.value) session.value = { ...session.value, user: null };
  }

  return {
    user,
    farm,
    role,
    csrfToken,
    needsSetup,
    demoSignIns,
    isLoaded,
    timeZone,
    currency,
    can,
    adopt,
    load,
    signIn,
    signInAsDemo,
    setUpFarm,
    signOut,
    signOutEverywhere,
    forgetUser,
  };
});

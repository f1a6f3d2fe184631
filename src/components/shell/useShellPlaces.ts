import { type ComputedRef, computed } from 'vue';
import { useRoute, useRouter } from 'vue-router';
import { PHONE_PLACES, PLACES, type Place, type PlaceName } from '@/router/places.ts';
import { useSessionStore } from '@/stores/session.ts';

/** The places that this person may use and that exist. */
export function useShellPlaces(): {
  places: ComputedRef<Place[]>;
  barPlaces: ComputedRef<Place[]>;
  morePlaces: ComputedRef<Place[]>;
  canScan: ComputedRef<boolean>;
  current: ComputedRef<PlaceName | undefined>;
} {
  const session = useSessionStore();
  const router = useRouter();
  const route = useRoute();

  const places = computed(() => PLACES.filter(({ name, access }) => session.can(access) && router.hasRoute(name)));
  const barPlaces = computed(() =>
    PHONE_PLACES.flatMap((name) => places.value.filter((place) => place.name === name)).slice(0, 3),
  );
  const morePlaces = computed(() => places.value.filter((place) => !barPlaces.value.includes(place)));
  const canScan = computed(() => session.can('stock.read') && router.hasRoute('scan'));
  const current = computed(() => route.meta.place);
  return { places, barPlaces, morePlaces, canScan, current };
}

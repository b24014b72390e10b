import { shallowRef, type ShallowRef } from 'vue';
import type { UnitConverter } from '../../shared/quantities.js';

const converter = shallowRef<UnitConverter>();
let loading: Promise<void> | undefined;

/** The conversion table, loaded once and only when somebody needs it: it is large. */
export function useUnits(): { converter: Readonly<ShallowRef<UnitConverter | undefined>>; load: () => Promise<void> } {
  function load(): Promise<void> {
    loading ??= import('../../shared/units.js').then(
      (units) => {
        converter.value = units.convertUnit;
      },
      () => {
        // Not reachable just now: the next field that needs it tries again.
        loading = undefined;
      },
    );
    return loading;
  }
  return { converter, load };
}

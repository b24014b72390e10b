import { shallowRef, type ShallowRef } from 'vue';
import type { UnitConverter } from '../../shared/quantities.js';

const converter = shallowRef<UnitConverter>();
const failed = shallowRef(false);
let loading: Promise<void> | undefined;

/** The conversion table, loaded once and only when somebody needs it: it is large. */
export function useUnits(): {
  converter: Readonly<ShallowRef<UnitConverter | undefined>>;
  /** True while the table cannot be had: lengths in mm, temperatures in °C and the like are read all the same. */
  failed: Readonly<ShallowRef<boolean>>;
  load: () => Promise<void>;
} {
  function load(): Promise<void> {
    loading ??= import('../../shared/units.js').then(
      (units) => {
        converter.value = units.convertUnit;
        failed.value = false;
      },
      () => {
        // Not reachable just now: the next field that needs it tries again.
        loading = undefined;
        failed.value = true;
      },
    );
    return loading;
  }
  return { converter, failed, load };
}

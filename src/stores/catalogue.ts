import { defineStore } from 'pinia';
import { computed, ref, shallowRef } from 'vue';
import type { FinishVersion, MaterialVersion, PartTypeVersion } from '../../shared/schemas/reference-lists.js';
import { fetchFinishes, fetchMaterials, fetchPartTypes } from '../api/sheet.js';
import type { Choice } from '../components/sheet/choice.js';

export type CatalogueKind = 'material' | 'finish' | 'part';

const groupNames: Record<string, string> = {
  'print-polymer': 'Print polymers',
  'moulding-polymer': 'Moulding polymers',
  metal: 'Metals',
  laminate: 'Laminates',
  interface: 'Interface materials',
  adhesive: 'Adhesives',
  potting: 'Potting',
  ceramic: 'Ceramics and glass',
  wood: 'Wood',
  'led-array': 'LED arrays',
  resistor: 'Resistors',
  shunt: 'Shunts',
  converter: 'Converters',
  regulator: 'Regulators',
  semiconductor: 'Semiconductors',
  other: 'Others',
};

/** The reference values that the sheet’s choices offer: loaded once, then at hand. */
export const useCatalogueStore = defineStore('catalogue', () => {
  const materials = shallowRef<readonly MaterialVersion[]>([]);
  const finishes = shallowRef<readonly FinishVersion[]>([]);
  const partTypes = shallowRef<readonly PartTypeVersion[]>([]);
  const state = ref<'empty' | 'loading' | 'ready' | 'failed'>('empty');
  let loading: Promise<void> | undefined;

  async function fetchAll(): Promise<void> {
    state.value = 'loading';
    try {
      [materials.value, finishes.value, partTypes.value] = await Promise.all([
        fetchMaterials(),
        fetchFinishes(),
        fetchPartTypes(),
      ]);
      state.value = 'ready';
    } catch (error) {
      state.value = 'failed';
      loading = undefined;
      throw error;
    }
  }

  function load(): Promise<void> {
    loading ??= fetchAll();
    return loading;
  }

  const rows = computed(() => ({
    material: materials.value.map(({ version, content }) => ({ version, name: content.name, group: content.group })),
    finish: finishes.value.map(({ version, content }) => ({ version, name: content.name, group: '' })),
    part: partTypes.value.map(({ version, content }) => ({ version, name: content.name, group: content.class })),
  }));

  function choices(kind: CatalogueKind): Choice[] {
    return rows.value[kind].map(({ version, name, group }) => ({
      value: version,
      label: name,
      group: groupNames[group] ?? group,
    }));
  }

  /** Name of what a document refers to, be it a version or a value in place. */
  function nameOf(kind: CatalogueKind, reference: unknown): string {
    if (typeof reference !== 'object' || reference === null) return 'not known';
    if ('inline' in reference) {
      const { inline } = reference;
      return typeof inline === 'object' && inline !== null && 'name' in inline
        ? String(inline.name)
        : 'a value in place';
    }
    const version = 'version' in reference ? reference.version : undefined;
    return rows.value[kind].find((row) => row.version === version)?.name ?? 'an earlier version';
  }

  /** Name of a version of any kind; `undefined` where none of the newest has it. */
  function nameOfVersion(version: string): string | undefined {
    const all = [...rows.value.material, ...rows.value.finish, ...rows.value.part];
    return all.find((row) => row.version === version)?.name;
  }

  function partType(reference: unknown): PartTypeVersion['content'] | undefined {
    if (typeof reference !== 'object' || reference === null) return undefined;
    if ('inline' in reference) return reference.inline as PartTypeVersion['content'];
    const version = 'version' in reference ? reference.version : undefined;
    return partTypes.value.find((row) => row.version === version)?.content;
  }

  return { materials, finishes, partTypes, state, load, choices, nameOf, nameOfVersion, partType };
});

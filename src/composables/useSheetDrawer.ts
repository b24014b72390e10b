import { inject, nextTick, provide, shallowReadonly, shallowRef, type InjectionKey, type ShallowRef } from 'vue';
import { pointerSegments } from './document-path.js';

/** What the drawer beside the sheet shows. */
export type DrawerSubject =
  | { kind: 'part' | 'carrier' | 'supply' | 'lead' | 'scenario'; index: number }
  | { kind: 'working'; node: string }
  | { kind: 'assumed' };

interface SheetDrawer {
  subject: Readonly<ShallowRef<DrawerSubject | null>>;
  /** Pointer of the field that is being gone to: what hides fields shows this one. */
  target: Readonly<ShallowRef<string | null>>;
  open: (subject: DrawerSubject) => void;
  close: () => void;
  /** Opens what hides the field of a pointer, scrolls there and puts the focus into it. */
  goTo: (pointer: string) => Promise<void>;
}

const key: InjectionKey<SheetDrawer> = Symbol('sheet drawer');
const kinds = { parts: 'part', carriers: 'carrier', supplies: 'supply', leads: 'lead', scenarios: 'scenario' } as const;

/** The drawer that holds the field of a pointer; `null` for fields on the sheet itself. */
export function drawerOf(pointer: string): DrawerSubject | null {
  const [list = '', index = ''] = pointerSegments(pointer);
  const kind = list in kinds ? kinds[list as keyof typeof kinds] : undefined;
  return kind === undefined || !/^\d+$/.test(index) ? null : { kind, index: Number(index) };
}

function fieldAt(pointer: string): HTMLElement | null {
  const segments = pointerSegments(pointer);
  for (let length = segments.length; length > 0; length -= 1) {
    const path = segments
      .slice(0, length)
      .map((segment) => `/${segment}`)
      .join('');
    const field = document.querySelector<HTMLElement>(`[data-path~="${CSS.escape(path)}"]`);
    if (field) return field;
  }
  return null;
}

export function provideSheetDrawer(showSection: (pointer: string) => void): SheetDrawer {
  const subject = shallowRef<DrawerSubject | null>(null);
  const target = shallowRef<string | null>(null);
  const drawer: SheetDrawer = {
    subject: shallowReadonly(subject),
    target: shallowReadonly(target),
    open: (next) => {
      subject.value = next;
    },
    close: () => {
      subject.value = null;
    },
    goTo: async (pointer) => {
      target.value = pointer;
      subject.value = drawerOf(pointer);
      showSection(pointer);
      await nextTick();
      await nextTick();
      const field = fieldAt(pointer);
      field?.scrollIntoView({ block: 'center' });
      field?.querySelector<HTMLElement>('input, select, textarea, button')?.focus({ preventScroll: true });
      target.value = null;
    },
  };
  provide(key, drawer);
  return drawer;
}

export function useSheetDrawer(): SheetDrawer {
  const drawer = inject(key);
  if (!drawer) throw new Error('There is no sheet around this component');
  return drawer;
}

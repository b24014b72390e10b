import { onBeforeUnmount, onMounted, readonly, ref, type Ref } from 'vue';

/** Width of an element in CSS pixels, kept current: pictures are drawn at their true size, so that text stays readable. */
export function useWidth(element: Readonly<Ref<HTMLElement | null>>, atFirst = 520): Readonly<Ref<number>> {
  const width = ref(atFirst);
  let observer: ResizeObserver | undefined;
  onMounted(() => {
    const target = element.value;
    if (!target) return;
    const measure = () => {
      const measured = target.clientWidth;
      if (measured > 0) width.value = measured;
    };
    measure();
    observer = new ResizeObserver(measure);
    observer.observe(target);
  });
  onBeforeUnmount(() => observer?.disconnect());
  return readonly(width);
}

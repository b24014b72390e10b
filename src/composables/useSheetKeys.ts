import { onBeforeUnmount, onMounted } from 'vue';

function isTextField(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  return (
    target.isContentEditable ||
    target instanceof HTMLTextAreaElement ||
    (target instanceof HTMLInputElement && target.type === 'text')
  );
}

/** Undo and redo by keyboard. Inside a text field the browser’s own undo stands. */
export function useSheetKeys(actions: { undo: () => void; redo: () => void }): void {
  function press(event: KeyboardEvent): void {
    if (!(event.ctrlKey || event.metaKey) || event.altKey || isTextField(event.target)) return;
    const letter = event.key.toLowerCase();
    if (letter !== 'z' && letter !== 'y') return;
    event.preventDefault();
    if (letter === 'y' || event.shiftKey) actions.redo();
    else actions.undo();
  }
  onMounted(() => {
    window.addEventListener('keydown', press);
  });
  onBeforeUnmount(() => {
    window.removeEventListener('keydown', press);
  });
}

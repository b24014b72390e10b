import { flushPromises, mount } from '@vue/test-utils';
import { describe, expect, test } from 'vitest';
import type { QuantityKind } from '../../../shared/quantities.js';
import QuantityField from '../../../src/components/sheet/QuantityField.vue';
import { useUnits } from '../../../src/composables/useUnits.js';

function field(props: {
  modelValue: unknown;
  kind?: QuantityKind;
  unknown?: boolean;
  error?: string;
  assumed?: string;
}) {
  return mount(QuantityField, { props: { kind: 'length', label: 'Wall', ...props } });
}

describe('a quantity field', () => {
  test('shows a stored value in its own unit, and hands on what is typed in the stored one', async () => {
    const wrapper = field({ modelValue: 0.0024 });
    const input = wrapper.get('input');
    expect(input.element.value).toBe('2.4 mm');
    await input.setValue('0,3 cm');
    await useUnits().load();
    await flushPromises();
    expect(wrapper.emitted('update:modelValue')?.at(-1)).toEqual([0.003]);
  });

  test('shows the value understood beside what was typed', async () => {
    const wrapper = field({ modelValue: null, unknown: true });
    await wrapper.get('input').setValue('0,09 m');
    expect(wrapper.text()).toContain('= 90\u00a0mm');
    await wrapper.get('input').setValue('1,234');
    expect(wrapper.text()).toContain('for 1234 leave it out');
  });

  test('keeps a text that cannot be read, says why, and hands it on as it stands', async () => {
    const wrapper = field({ modelValue: 0.002 });
    await wrapper.get('input').setValue('two spans');
    expect(wrapper.emitted('update:modelValue')?.at(-1)).toEqual(['two spans']);
    expect(wrapper.get('[role=alert]').text()).toContain('is not a number');
    expect(wrapper.get('input').attributes('aria-invalid')).toBe('true');
    await wrapper.get('input').trigger('blur');
    expect(wrapper.get('input').element.value).toBe('two spans');
  });

  test('an unread text comes back from a saved draft as it was typed', () => {
    expect(field({ modelValue: '12 apples' }).get('input').element.value).toBe('12 apples');
  });

  test('don’t know is one press, or a question mark, and shows what is assumed', async () => {
    const wrapper = field({ modelValue: 0.002, unknown: true, assumed: '3 mm' });
    expect(wrapper.text()).not.toContain('assumed');
    await wrapper.get('button').trigger('click');
    expect(wrapper.emitted('update:modelValue')?.at(-1)).toEqual([null]);
    await wrapper.setProps({ modelValue: null });
    expect(wrapper.text()).toContain('assumed 3 mm');
    await wrapper.get('input').setValue('?');
    expect(wrapper.get('button').attributes('aria-pressed')).toBe('true');
  });

  test('a field that must be known says so instead', async () => {
    const wrapper = field({ modelValue: 0.1 });
    expect(wrapper.find('button').exists()).toBe(false);
    await wrapper.get('input').setValue('?');
    expect(wrapper.get('[role=alert]').text()).toBe('A value is needed here');
  });

  test('an error of the whole document is told in the field’s unit', () => {
    const wrapper = field({ modelValue: 0.00001, error: 'The wall thickness must be at least 0.0001 m' });
    expect(wrapper.get('[role=alert]').text()).toBe('The wall thickness must be at least 0.1 mm');
  });

  test('a field for several values that differ changes none of them by itself', async () => {
    const wrapper = mount(QuantityField, {
      props: { kind: 'length', label: 'Wall', modelValue: '', mixed: true, unknown: true },
    });
    await useUnits().load();
    await flushPromises();
    await wrapper.get('input').trigger('focus');
    await wrapper.get('input').trigger('blur');
    expect(wrapper.emitted('update:modelValue')).toBeUndefined();
    expect(wrapper.get('input').attributes('placeholder')).toBe('differs');
  });

  test('typing is not disturbed by the value that comes back', async () => {
    const wrapper = field({ modelValue: 0.001 });
    const input = wrapper.get('input');
    await input.setValue('1.');
    await wrapper.setProps({ modelValue: 0.001 });
    expect(input.element.value).toBe('1.');
    await wrapper.setProps({ modelValue: 0.005 });
    expect(input.element.value).toBe('5 mm');
  });
});

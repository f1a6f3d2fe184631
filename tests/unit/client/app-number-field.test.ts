import { mount } from '@vue/test-utils';
import { createPinia, setActivePinia } from 'pinia';
import { beforeEach, describe, expect, it } from 'vitest';
import { nextTick } from 'vue';
import AppNumberField from '../../../src/components/AppNumberField.vue';
import { makeVuetify } from '../../../src/plugins/vuetify.ts';
import { useUnitChoicesStore } from '../../../src/stores/unit-choices.ts';

beforeEach(() => {
  localStorage.clear();
  setActivePinia(createPinia());
});

/** A field for salinity with the unit that the person chose, and what it holds. */
function salinityField(unit: string) {
  useUnitChoicesStore().choose('salinity', unit);
  const held: { value: number | null | undefined } = { value: null };
  const wrapper = mount(AppNumberField, {
    props: {
      label: 'Salinity',
      quantity: 'salinity' as const,
      modelValue: null as number | null,
      'onUpdate:modelValue': (value: number | null | undefined) => {
        held.value = value;
        void wrapper.setProps({ modelValue: value ?? null });
      },
    },
    global: { plugins: [makeVuetify(undefined)] },
  });
  const type = async (text: string) => {
    await wrapper.get('input').setValue(text);
    await nextTick();
  };
  return { wrapper, held, type, shown: () => wrapper.get('input').element.value };
}

describe('AppNumberField', () => {
  it('when a specific gravity is typed, holds the salinity', async () => {
    const { held, type } = salinityField('sg');
    await type('1.0264');
    expect(held.value).toBeCloseTo(35.04, 2);
  });

  it('when what is typed is no value of its unit, says why, keeps the text and holds nothing', async () => {
    const { wrapper, held, type, shown } = salinityField('sg');
    await type('1.0264');
    await type('35');
    expect(held.value).toBeNull();
    expect(shown()).toBe('35');
    expect(wrapper.text()).toContain('must be between 1 and 1.0317');

    await type('1.025');
    expect(held.value).toBeCloseTo(33.2, 1);
    expect(wrapper.text()).not.toContain('must be');
  });

  it('when the value comes from outside, shows it in the chosen unit', async () => {
    const { wrapper, shown } = salinityField('mS/cm');
    await wrapper.setProps({ modelValue: 35 });
    // gsw 3.6.16 C_from_SP(35, 25, 0) = 53.07103205 mS/cm.
    expect(shown()).toBe('53.07');
    expect(wrapper.text()).toContain('at 25 °C');
  });
});

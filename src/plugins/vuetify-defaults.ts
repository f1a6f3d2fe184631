import type { DefaultsInstance } from 'vuetify';

const field = {
  variant: 'outlined',
  density: 'comfortable',
  color: 'primary',
  baseColor: undefined,
  hideDetails: 'auto',
  rounded: 'md',
} as const;

/** Set once here, so that pages carry almost no styling: flat, ruled, calm. */
export const componentDefaults: DefaultsInstance = {
  global: { ripple: false, elevation: 0 },
  VBtn: { variant: 'outlined', rounded: 'md', class: 'act' },
  VCard: { variant: 'flat', rounded: 'md', border: true },
  VMenu: { transition: 'fade-transition', offset: 6 },
  VList: { density: 'comfortable', rounded: 'md', border: true, elevation: 0 },
  VTextField: field,
  VTextarea: { ...field, autoGrow: true, rows: 2 },
  VSelect: { ...field, menuProps: { contentClass: 'choice-list' } },
  VAutocomplete: { ...field, autoSelectFirst: true, menuProps: { contentClass: 'choice-list' } },
  VCombobox: { ...field, menuProps: { contentClass: 'choice-list' } },
  VFileInput: field,
  VCheckbox: { color: 'primary', hideDetails: 'auto', density: 'comfortable' },
  VRadioGroup: { color: 'primary', hideDetails: 'auto' },
  VSwitch: { color: 'primary', hideDetails: 'auto', inset: true },
  VBtnToggle: { variant: 'outlined', rounded: 'md', divided: true, mandatory: true },
  VTabs: { color: 'primary', density: 'comfortable', sliderColor: 'primary' },
  VChip: { rounded: 'sm', variant: 'tonal' },
  VTooltip: { openDelay: 300 },
  VDialog: { transition: 'fade-transition' },
};

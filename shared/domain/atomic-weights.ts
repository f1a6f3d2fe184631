/** CIAAW abridged standard atomic weights (2021), g/mol, of the elements the product reckons with. */
export const ATOMIC_G_PER_MOL = {
  H: 1.008,
  C: 12.011,
  N: 14.007,
  O: 15.999,
  Na: 22.99,
  Mg: 24.305,
  P: 30.974,
  S: 32.06,
  Cl: 35.45,
  K: 39.098,
  Ca: 40.078,
  Sr: 87.62,
} as const;

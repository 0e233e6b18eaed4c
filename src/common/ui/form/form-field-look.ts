import type { Provider } from '@angular/core';
import {
  MAT_FORM_FIELD_DEFAULT_OPTIONS,
  type MatFormFieldDefaultOptions,
} from '@angular/material/form-field';

const look: MatFormFieldDefaultOptions = {
  appearance: 'outline',
  // The label stands above the frame, see theme/clinic/fields.
  floatLabel: 'always',
  subscriptSizing: 'dynamic',
};

/** Fields of a form: an outline like every other control of the clinic, and room below only when something is said. */
export const formFieldLook: Provider = {
  provide: MAT_FORM_FIELD_DEFAULT_OPTIONS,
  useValue: look,
};

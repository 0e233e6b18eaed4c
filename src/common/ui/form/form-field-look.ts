import type { Provider } from '@angular/core';
import {
  MAT_FORM_FIELD_DEFAULT_OPTIONS,
  type MatFormFieldDefaultOptions,
} from '@angular/material/form-field';

const look: MatFormFieldDefaultOptions = { appearance: 'outline', subscriptSizing: 'dynamic' };

/** Fields of a form: an outline like every other control of the clinic, and room below only when something is said. */
export const formFieldLook: Provider = {
  provide: MAT_FORM_FIELD_DEFAULT_OPTIONS,
  useValue: look,
};

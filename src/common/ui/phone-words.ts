import { Pipe, type PipeTransform } from '@angular/core';

/** '312-555-0142': numbers of the country at hand without its code; any other number as it is dialled. */
export const phoneWords = (phone: string): string =>
  phone.replace(/^\+1(\d{3})(\d{3})(\d{4})$/, '$1-$2-$3');

@Pipe({ name: 'tdPhone' })
export class PhonePipe implements PipeTransform {
  transform(phone: string): string {
    return phoneWords(phone);
  }
}

import { Pipe, type PipeTransform } from '@angular/core';
import type { Language } from '../../../shared/languages/languages';

/** The name of a language as staff calls it: 'Burmese', 'birmano'. */
@Pipe({ name: 'tdLanguageName' })
export class LanguageNamePipe implements PipeTransform {
  transform({ id, englishName }: Language): string {
    const locale = $localize.locale ?? 'en';
    if (locale.startsWith('en')) return englishName;
    return new Intl.DisplayNames([locale], { type: 'language' }).of(id) ?? englishName;
  }
}

import { Injectable, inject } from '@angular/core';
import { Title } from '@angular/platform-browser';
import { TitleStrategy } from '@angular/router';

/** One word for every page: titles stand in histories and on lock screens, so they name nothing. */
@Injectable()
export class NeutralTitle extends TitleStrategy {
  private readonly title = inject(Title);

  override updateTitle(): void {
    this.title.setTitle($localize`:@@family.title:Visit`);
  }
}

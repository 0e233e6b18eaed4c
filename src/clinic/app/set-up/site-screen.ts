import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { Router, RouterLink } from '@angular/router';
import { siteForm, type PlacesOfCountry, type SetUp } from '../../../../shared/contracts/set-up';
import { languages } from '../../../../shared/languages/languages';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SetUpClient } from '../../../common/api/clinic/set-up-client';
import { faultOf, issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';
import { LanguageNamePipe } from '../../../common/ui/language-name';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import {
  dawnFields,
  messageFields,
  morningFields,
  placeFields,
  siteGroup,
  siteLike,
  type SiteGroup,
} from './site-form';
import { SiteFields } from './site-fields';
import { weekdayWords } from './weekday-words';

/** One site: where families come, when, and what they are told at which hour. */
@Component({
  selector: 'td-site-screen',
  imports: [
    LanguageNamePipe,
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
    ReactiveFormsModule,
    RouterLink,
    SheetStates,
    SiteFields,
  ],
  templateUrl: './site-screen.html',
  styleUrls: [
    '../../../common/ui/form/fields.scss',
    '../../../common/ui/form/form-page.scss',
    './site-screen.scss',
  ],
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SiteScreen {
  private readonly client = inject(SetUpClient);
  private readonly router = inject(Router);
  private readonly summary = viewChild<ElementRef<HTMLElement>>('summary');
  /** One key a form: sending it again after a lost answer makes no second site. */
  private readonly submissionKey = crypto.randomUUID();

  /** A site's id, or 'new'. */
  readonly siteId = input.required<string>();

  protected readonly isNew = computed(() => this.siteId() === 'new');
  protected readonly loaded = new Loaded(() =>
    this.client.read(this.isNew() ? null : Number(this.siteId())),
  );
  protected readonly form = signal<SiteGroup | null>(null);
  protected readonly places = signal<PlacesOfCountry | null>(null);
  protected readonly says = signal<readonly string[]>([]);
  protected readonly isStale = signal(false);
  protected readonly isBusy = signal(false);
  protected readonly faultOf = faultOf;
  protected readonly weekdays = weekdayWords;
  protected readonly languages = languages;
  protected readonly zones = Intl.supportedValuesOf('timeZone');
  protected readonly fields = {
    place: placeFields,
    dawn: dawnFields,
    morning: morningFields,
    message: messageFields,
  };
  private version = 0;

  constructor() {
    effect(() => {
      this.siteId();
      untracked(() => void this.open());
    });
  }

  /** The form as the site stands; what was typed is gone. */
  protected async open(): Promise<void> {
    await this.loaded.again();
    const setUp = this.loaded.value();
    if (setUp) this.fill(this.isNew() ? siteLike(setUp.site) : setUp.site);
  }

  protected countrySays(code: string): string {
    return countryNames.of(code) ?? code;
  }

  protected async chooseCountry(country: string): Promise<void> {
    const form = this.form();
    if (!form) return;
    form.controls.region.setValue('');
    const places = await this.client.places(country).catch(() => null);
    this.places.set(places);
    if (places?.emergencyNumber) form.controls.emergencyNumber.setValue(places.emergencyNumber);
  }

  protected turn(weekday: number): void {
    const control = this.form()?.controls.clinicWeekdays;
    const days = control?.value ?? [];
    control?.setValue(
      days.includes(weekday) ? days.filter((one) => one !== weekday) : [...days, weekday].sort(),
    );
  }

  protected async submit(): Promise<void> {
    const form = this.form();
    if (!form || this.isBusy()) return;
    const parsed = siteForm.safeParse(form.getRawValue());
    if (!parsed.success) {
      this.refuse(form, issuesByPath(parsed.error.issues));
      return;
    }
    this.isBusy.set(true);
    this.says.set([]);
    try {
      const { site } = this.isNew()
        ? await this.client.addSite({ ...parsed.data, submissionKey: this.submissionKey })
        : await this.client.saveSite(Number(this.siteId()), {
            ...parsed.data,
            version: this.version,
          });
      await this.router.navigate(['/set-up'], { queryParams: { site: site.id, kept: 'site' } });
    } catch (error) {
      const failure = clinicFailure(error);
      this.isStale.set(failure.code === 'changed-meanwhile');
      const hasFields = failure.fields.size > 0;
      this.refuse(form, failure.fields, hasFields ? [] : [failure.message]);
    } finally {
      this.isBusy.set(false);
    }
  }

  private fill(site: SetUp['site']): void {
    this.version = site.version;
    this.form.set(siteGroup(site));
    this.says.set([]);
    this.isStale.set(false);
    void this.client
      .places(site.country)
      .then((places) => this.places.set(places))
      .catch(() => this.places.set(null));
  }

  private refuse(
    form: SiteGroup,
    faults: ReadonlyMap<string, string>,
    more: readonly string[] = [],
  ): void {
    const rest = [...more, ...showFaults(form, faults)];
    const count = faults.size - rest.length + more.length;
    this.says.set(
      count > 0 ? [$localize`:@@clinic.site.look:Some fields need another look.`, ...rest] : rest,
    );
    setTimeout(() => this.summary()?.nativeElement.focus());
  }
}

const countryNames = new Intl.DisplayNames([$localize.locale ?? 'en'], { type: 'region' });

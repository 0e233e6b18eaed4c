import { Injectable, inject } from '@angular/core';
import {
  individualPlanPreview,
  individualPlans,
  type IndividualPlanPreview,
  type IndividualPlans,
  type PreviewIndividualPlanRequest,
  type SignIndividualPlanRequest,
} from '../../../../shared/contracts/individual-plans';
import { ClinicHttp } from './clinic-http';

/** Plans that a clinician composes for one child. */
@Injectable({ providedIn: 'root' })
export class IndividualPlansClient {
  private readonly http = inject(ClinicHttp);

  ofChild(childId: number): Promise<IndividualPlans> {
    return this.http.get(`/children/${childId}/individual-plans`, individualPlans);
  }

  /** What the family would read; nothing is kept. */
  preview(childId: number, request: PreviewIndividualPlanRequest): Promise<IndividualPlanPreview> {
    return this.http.post(
      `/children/${childId}/individual-plans/preview`,
      request,
      individualPlanPreview,
    );
  }

  sign(childId: number, request: SignIndividualPlanRequest): Promise<IndividualPlans> {
    return this.http.post(`/children/${childId}/individual-plans`, request, individualPlans);
  }

  end(planId: number, reason: string): Promise<IndividualPlans> {
    return this.http.post(`/individual-plans/${planId}/end`, { reason }, individualPlans);
  }
}

import { Injectable, inject } from '@angular/core';
import * as z from 'zod';
import {
  pauseMorningAnswer,
  replanOutcome,
  replanProposal,
  withNextReplan,
  type PauseMorningAnswer,
  type ReplanOutcome,
  type ReplanPreviewRequest,
  type ReplanProposal,
  type ReplanProposalRequest,
  type ReplanRequest,
} from '../../../../shared/contracts/replan';
import {
  planSeriesAnswer,
  previewSeriesAnswer,
  seriesProposal,
  withNextOffers,
  type PlanSeriesAnswer,
  type PlanSeriesRequest,
  type PreviewSeriesAnswer,
  type ProposeSeriesRequest,
  type SeriesProposal,
} from '../../../../shared/contracts/series';
import { ClinicHttp, type ClinicFailure } from './clinic-http';

@Injectable({ providedIn: 'root' })
export class SeriesClient {
  private readonly http = inject(ClinicHttp);

  propose(request: ProposeSeriesRequest): Promise<SeriesProposal> {
    return this.http.post('/series/proposals', request, seriesProposal);
  }

  preview(request: PlanSeriesRequest): Promise<PreviewSeriesAnswer> {
    return this.http.post('/series/previews', request, previewSeriesAnswer);
  }

  plan(request: PlanSeriesRequest): Promise<PlanSeriesAnswer> {
    return this.http.post('/series', request, planSeriesAnswer);
  }

  proposeReplan(request: ReplanProposalRequest): Promise<ReplanProposal> {
    return this.http.post('/series/replan-proposals', request, replanProposal);
  }

  previewReplan(request: ReplanPreviewRequest): Promise<ReplanOutcome> {
    return this.http.post('/series/replan-previews', request, replanOutcome);
  }

  replan(request: ReplanRequest): Promise<ReplanOutcome> {
    return this.http.post('/series/replans', request, replanOutcome);
  }

  pause(morningId: number, reason: string): Promise<PauseMorningAnswer> {
    return this.http.post(`/mornings/${morningId}/pause`, { reason }, pauseMorningAnswer);
  }

  async loseMorning(morningId: number, reason: string): Promise<void> {
    await this.http.post(`/mornings/${morningId}/loss`, { reason }, z.unknown());
  }

  async close(seriesId: number, reason: string): Promise<void> {
    await this.http.post(`/series/${seriesId}/closure`, { reason }, z.unknown());
  }
}

/** What is left, where somebody else was first; null for other failures. */
export function nextOffersIn({ problem }: ClinicFailure): SeriesProposal | null {
  const found = withNextOffers.safeParse(problem);
  return found.success ? found.data.proposal : null;
}

export function nextReplanIn({ problem }: ClinicFailure): ReplanProposal | null {
  const found = withNextReplan.safeParse(problem);
  return found.success ? found.data.replan : null;
}

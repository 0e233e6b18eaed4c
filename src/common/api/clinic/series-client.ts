import { Injectable, inject } from '@angular/core';
import * as z from 'zod';
import {
  planSeriesAnswer,
  previewSeriesAnswer,
  seriesProposal,
  type PlanSeriesAnswer,
  type PlanSeriesRequest,
  type PreviewSeriesAnswer,
  type ProposeSeriesRequest,
  type SeriesProposal,
} from '../../../../shared/contracts/series';
import { ClinicHttp } from './clinic-http';

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

  async loseMorning(morningId: number, reason: string): Promise<void> {
    await this.http.post(`/mornings/${morningId}/loss`, { reason }, z.unknown());
  }

  async close(seriesId: number, reason: string): Promise<void> {
    await this.http.post(`/series/${seriesId}/closure`, { reason }, z.unknown());
  }
}

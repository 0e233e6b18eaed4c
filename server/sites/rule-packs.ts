import { addDays, weekdayOf, type Day } from '../../shared/domain/day';

/** Who must be told by when, where a site stands. Data, so that another country or state is another row. */
export interface ReportingRule {
  readonly country: string;
  /** Null holds for the whole country. */
  readonly region: string | null;
  /** What starts the clock. */
  readonly trigger: 'order-signed';
  readonly withinWorkingDays: number;
  readonly source: string;
}

/**
 * Suspicion alone can start the clock, so that the signature of an order does. State law governs; the clinic confirms
 * the row that holds for it.
 */
export const reportingRules: readonly ReportingRule[] = [
  {
    country: 'US',
    region: null,
    trigger: 'order-signed',
    withinWorkingDays: 1,
    source:
      'Los Angeles County: 1 working day; CDC model law: 24 hours recommended, every state requires a report',
  },
  {
    country: 'GB',
    region: null,
    trigger: 'order-signed',
    withinWorkingDays: 3,
    source: 'England, Wales, Northern Ireland: suspected or confirmed, within 3 working days',
  },
];

export function reportingRuleOf(site: {
  readonly country: string;
  readonly region: string | null;
}): ReportingRule | null {
  const inCountry = reportingRules.filter((rule) => rule.country === site.country);
  return (
    inCountry.find((rule) => rule.region !== null && rule.region === site.region) ??
    inCountry.find((rule) => rule.region === null) ??
    null
  );
}

/** The day by which the report is due; Saturdays, Sundays and closed days do not count. */
export function reportingDueOn(
  rule: ReportingRule,
  from: Day,
  closedDays: ReadonlySet<Day> = new Set(),
): Day {
  let day = from;
  for (let left = rule.withinWorkingDays; left > 0;) {
    day = addDays(day, 1);
    if (weekdayOf(day) <= 5 && !closedDays.has(day)) left -= 1;
  }
  return day;
}

/**
 * The number to call when a child is in danger, by country: what a new site starts with. From national numbering plans,
 * written down from memory; whoever sets a site up looks at it.
 */
const emergencyNumbers: Readonly<Record<string, string>> = {
  US: '911',
  CA: '911',
  MX: '911',
  GB: '999',
  AU: '000',
  ZA: '112',
  IN: '112',
  BR: '192',
};

export const emergencyNumberOf = (country: string): string | null =>
  emergencyNumbers[country] ?? null;

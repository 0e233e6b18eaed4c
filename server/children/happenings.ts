import type { Sequelize } from 'sequelize';
import type { z } from 'zod';
import { can, isRole } from '../../shared/access/rights';
import type { happening } from '../../shared/contracts/children';
import type { TestKind } from '../../shared/contracts/specimens';
import type { StaffMember } from '../auth/current-user';
import { select } from '../database/connection';
import { resultSays } from '../results/result-says';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { happeningSources } from './happening-sources';
import { withoutLinks } from './without-links';

export type Happening = z.infer<typeof happening>;

type HappeningFacts = Readonly<Record<string, string | number>> & { readonly key: string };

interface HappeningRow {
  at: Date;
  kind: string;
  /** JSON of what its sentence tells, as text or already read. */
  facts: string | HappeningFacts;
  by: string | null;
}

/** Everything that happened around a child in one column of time, newest first, as far as the reader's roles reach. */
export async function happeningsOf(
  db: Sequelize,
  staff: StaffMember,
  child: { readonly id: number; readonly householdId: number },
): Promise<Happening[]> {
  const roles = staff.roles.filter(isRole);
  const words = clinicWords(staff.language);
  const visible = happeningSources.filter((source) => can(roles, source.right));
  const found = await Promise.all(
    visible.map(({ sql }) =>
      select<HappeningRow>(db, sql, { childId: child.id, householdId: child.householdId }),
    ),
  );
  return found
    .flat()
    .sort((left, right) => right.at.getTime() - left.at.getTime())
    .map(({ at, facts, ...row }) => ({
      ...row,
      says: withoutLinks(happeningSays(words, facts)),
      at: at.toISOString(),
    }));
}

function happeningSays(words: ClinicWords, stored: HappeningRow['facts']): string {
  const { key, ...facts } =
    typeof stored === 'string' ? (JSON.parse(stored) as HappeningFacts) : stored;
  const fact = (name: string): string => String(facts[name]);
  const result =
    key === 'result'
      ? resultSays(words, fact('test') as TestKind, fact('value'), fact('finality'))
      : '';
  const outcome = key === 'call' ? words.text(`clinic.call.outcome.${fact('outcome')}`) : '';
  return words.text(`clinic.happening.${key}`, { ...facts, result, outcome });
}

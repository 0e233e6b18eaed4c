import type {
  Consequences,
  ProtocolDetail,
  SignVersionRequest,
} from '../../shared/contracts/protocols';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { siteOf } from '../sites/sites';
import { clinicWords } from '../wording/clinic-words';
import { changedMornings, replanFrom } from './changed-mornings';
import { protocolDifferences } from './differences';
import { openProtocol, whenOf } from './protocol-desk';
import { protocolFrom, protocolProblems, protocolValuesOf } from './protocol-values';
import { signVersion } from './sign-version';
import { protocolKind, versionInForce, versionOf } from './versions';

/** What signing this draft would change: line by line, and for mornings that are planned. */
export async function protocolConsequences(
  context: Context,
  staff: StaffMember,
  id: number,
): Promise<Consequences> {
  const { db } = context;
  const { siteId } = staff;
  const words = clinicWords(staff.language);
  const row = await versionOf(db, protocolKind, siteId, id);
  const values = protocolValuesOf(row);
  const before = await versionInForce(db, protocolKind, siteId, values.effectiveOn);
  const problems = protocolProblems(
    words,
    values,
    await siteOf(db, siteId),
    await whenOf(context, protocolKind, siteId),
  );
  const mornings = await changedMornings(context, words, siteId, protocolFrom(values, row.version));
  return {
    draftVersion: row.draft_version,
    against: before
      ? words.text('clinic.signing.against', {
          version: before.version,
          title: words.sentence(before.title),
        })
      : null,
    differences: protocolDifferences(words, before && protocolValuesOf(before), values),
    ...mornings,
    problems,
  };
}

/** Signs, and plans the messages of the nights ahead by the new hours. @throws Problem as `signVersion`. */
export async function signProtocol(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  id: number,
  request: SignVersionRequest,
): Promise<ProtocolDetail> {
  const { siteId } = staff;
  const words = clinicWords(staff.language);
  const site = await siteOf(context.db, siteId);
  const when = await whenOf(context, protocolKind, siteId);
  await signVersion(context, actor, staff, id, request, {
    kind: protocolKind,
    problems: (row) => protocolProblems(words, protocolValuesOf(row), site, when),
    after: (transaction, row) => replanFrom(context, transaction, siteId, row.effective_on),
  });
  return openProtocol(context, staff, id);
}

import { randomUUID } from 'node:crypto';
import {
  protocolDetail,
  type ProtocolDetail,
  type ProtocolValues,
} from '../../shared/contracts/protocols';
import { staffPassword, type Agent } from './server';

export const protocolsPath = '/api/clinic/fasting-protocols';

/** A draft from the version in force. */
export async function draftProtocol(agent: Agent): Promise<ProtocolDetail> {
  const answer = await agent.post(protocolsPath).send({ submissionKey: randomUUID() }).expect(200);
  return protocolDetail.parse(answer.body);
}

export const saveProtocol = (agent: Agent, one: ProtocolDetail, values: Partial<ProtocolValues>) =>
  agent.put(`${protocolsPath}/${one.id}`).send({
    draftVersion: one.draftVersion,
    values: { ...one.values, ...values },
  });

export async function savedProtocol(
  agent: Agent,
  one: ProtocolDetail,
  values: Partial<ProtocolValues>,
): Promise<ProtocolDetail> {
  return protocolDetail.parse((await saveProtocol(agent, one, values).expect(200)).body);
}

export const signProtocol = (
  agent: Agent,
  { id, draftVersion }: Pick<ProtocolDetail, 'id' | 'draftVersion'>,
  password = staffPassword,
) => agent.post(`${protocolsPath}/${id}/signature`).send({ draftVersion, password });

/** The same hours, but children of one year stop two hours earlier; in force from 2027-04-14. */
export const twoHoursMore = ({ values }: ProtocolDetail): Partial<ProtocolValues> => ({
  title: 'Harbor hours',
  effectiveOn: '2027-04-14',
  bands: values.bands.map((band) =>
    band.fromMonths === 12 && band.leastHours
      ? {
          ...band,
          leastHours: Object.fromEntries(
            Object.keys(band.leastHours).map((item) => [item, 8]),
          ) as typeof band.leastHours,
        }
      : band,
  ),
});

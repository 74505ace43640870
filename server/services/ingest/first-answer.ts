import { withOrganisationBulk } from '../../database/tenancy'

/** Keeps what a waiting request was told, for a repeat with the same key; the plain `202` needs no keeping. */
export async function keepFirstAnswer(organisationId: string, submissionId: string, answer: { status: number, body: unknown }): Promise<void> {
  await withOrganisationBulk(organisationId, tx => tx`
    update submissions set first_answer = ${tx.json(answer as never)}
    where organisation_id = ${organisationId} and id = ${submissionId} and first_answer is null`)
}

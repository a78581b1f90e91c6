import knex, { type Knex } from 'knex';
import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { verifyVersions } from '../../scripts/lib/version-chains';
import { draftSchema, protocolSchema } from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Harness, startHarness } from './support/harness';
import { makeLab, saveVersion, target } from './support/lab';

let harness: Harness;
let owner: Knex;
beforeAll(async () => {
  harness = await startHarness();
  owner = knex({ client: 'pg', connection: harness.testDatabase.ownerUrl, pool: { min: 0, max: 2 } });
}, 60_000);
afterAll(async () => {
  await owner.destroy();
  await harness.close();
});

test('the chains of all labs are checked, and the version after one that was forged with its hash is named', async () => {
  const [lead, otherLead] = [await harness.signIn('adaeze-holm'), await harness.signIn('oskar-lindqvist')];
  await makeLab(harness, otherLead, 'Other lab');
  const lab = await makeLab(harness, lead, 'Own lab');
  const at = `/labs/${lab.labId}/protocols/${lab.protocolId}`;
  const { draft } = await answered(call(harness, lead, 'get', at), protocolSchema);
  await answered(
    call(harness, lead, 'put', `${at}/draft`, {
      body: { ...draft.content, targets: [target('d', 'D')] },
      ifMatch: '"r1"',
    }),
    draftSchema,
  );
  await saveVersion(harness, lead, lab.labId, await answered(call(harness, lead, 'get', at), protocolSchema));
  expect(await verifyVersions(owner)).toEqual({ ok: true, labs: 2, versions: 3 });

  const forger = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await forger.connect();
  // Past the triggers and foreign keys, as someone with the disk would be.
  await forger.query('set session_replication_role = replica');
  await forger.query(
    `update versions set content = forged, content_hash = encode(sha256(convert_to(forged, 'UTF8')), 'hex')
      from (select id, replace(content, '"message":"As measured today."', '"message":"As wished."') as forged
        from versions) as text
      where text.id = versions.id and protocol_id = $1 and number = 1`,
    [lab.protocolId],
  );
  await forger.end();
  expect(await verifyVersions(owner)).toEqual({
    ok: false,
    labName: 'Own lab',
    protocolName: 'Two states',
    number: 2,
    reason: 'it does not follow the version before it',
  });
});

// Opens an administrator's account, and the organisation where there is none of the name:
//   npm run -s add-administrator -- SIGN-IN-NAME NAME [ORGANISATION] < file-with-the-password
import { randomUUID } from 'node:crypto';
import { text } from 'node:stream/consumers';
import { newPersonSchema, organisationNameSchema } from '#libs/contract/people-schema.js';
import { readBySchema } from '#libs/contract/schema-problems.js';
import { openStore } from '#libs/store/open-store.js';
import { FIRST_ORGANISATION } from '#libs/store/organisation.js';
import { insertPerson, organisationNamed } from '#libs/store/people.js';
import { readSettings } from '../settings.js';
import { spelledName } from './accounts.js';
import { hashPassword } from './password-hash.js';

const [signInName, name, organisation, ...rest] = process.argv.slice(2);
if (signInName === undefined || name === undefined || rest.length > 0) {
  process.stderr.write(
    'say SIGN-IN-NAME and NAME, and an ORGANISATION where it is not the first; the password comes on standard input, ' +
      'so that it stands in no list of processes and no history\n',
  );
  process.exit(2);
}
try {
  await addAdministrator(signInName, name, organisation);
} catch (error) {
  process.stderr.write(`no account was opened: ${error instanceof Error ? error.message : error}\n`);
  process.exitCode = 3;
}

async function addAdministrator(signIn: string, shown: string, named: string | undefined): Promise<void> {
  const password = (await text(process.stdin)).replace(/\r?\n$/, '');
  const given = { signInName: signIn, name: shown, role: 'administrator', password };
  const person = readBySchema(newPersonSchema, given);
  const owner = named === undefined ? null : spelledName(readBySchema(organisationNameSchema, named));
  const hashed = await hashPassword(password);
  const store = await openStore(readSettings(process.env).dbUrl);
  try {
    await store.write(async (manager) => {
      const organisationId =
        owner === null ? FIRST_ORGANISATION : (await organisationNamed(manager, randomUUID(), owner)).id;
      const row = { ...person, id: randomUUID(), organisationId, signInName: spelledName(signIn), password: hashed };
      await insertPerson(manager, row, new Date());
    });
  } finally {
    await store.close();
  }
  process.stderr.write(`${spelledName(signIn)} may sign in${owner === null ? '' : ` to ${owner}`}\n`);
}

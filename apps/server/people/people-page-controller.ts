import { Body, Controller, Get, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { newPersonSchema, personChangeSchema } from '#libs/contract/people-schema.js';
import { readBySchema } from '#libs/contract/schema-problems.js';
import { Store } from '#libs/store/store.js';
import { Accounts } from './accounts.js';
import { type Actor, actorOf, CurrentActor } from './actor.js';
import { findPerson } from './find-person.js';
import { refusedForm } from './refused-form.js';
import { Needs } from './needs.js';
import { People } from './people.js';
import { peoplePage, personPage } from './people-page.js';
import { sendForm } from './send-form.js';

type Form = Record<string, string>;

/** The people of an organisation on pages without scripts, for its administrators. */
@Controller('people')
export class PeoplePageController {
  constructor(
    private readonly store: Store,
    private readonly people: People,
    private readonly accounts: Accounts,
  ) {}

  @Get()
  @Needs('administrator', 'Shows the people of the organisation, and a form to open an account.')
  async list(@CurrentActor() actor: Actor, @Res() reply: FastifyReply) {
    return this.#showAll(actor, reply, { status: 200, refused: null });
  }

  @Post()
  @Needs('administrator', 'Takes the form that opens an account.')
  async open(@CurrentActor() actor: Actor, @Body() form: Form, @Res() reply: FastifyReply) {
    try {
      await this.people.open(actor, readBySchema(newPersonSchema, form));
    } catch (error) {
      return this.#showAll(actor, reply, refusedForm(error));
    }
    return reply.redirect('/people', 303);
  }

  @Get(':personId')
  @Needs('administrator', 'Shows one account, and the forms that change it.')
  async one(@CurrentActor() actor: Actor, @Param('personId') id: string, @Res() reply: FastifyReply) {
    return sendForm(reply, 200, personPage(await findPerson(this.store, actor, id), null));
  }

  @Post(':personId')
  @Needs('administrator', 'Takes a form that changes or closes an account which has the version it shows.')
  async change(@Param('personId') id: string, @Body() form: Form, @Res() reply: FastifyReply) {
    const actor = actorOf(reply.request);
    const person = await findPerson(this.store, actor, id);
    try {
      await this.#act(actor, id, form);
    } catch (error) {
      const { status, refused } = refusedForm(error);
      return sendForm(reply, status, personPage(person, refused));
    }
    return reply.redirect('/people', 303);
  }

  async #act(actor: Actor, id: string, { act, version, ...fields }: Form): Promise<void> {
    const seen = { id, version: Number(version) };
    if (act === 'close') await this.people.close(actor, seen);
    else await this.people.change(actor, seen, readBySchema(personChangeSchema, fields));
  }

  async #showAll(actor: Actor, reply: FastifyReply, { status, refused }: { status: number; refused: string | null }) {
    const isFirst = await this.accounts.areNone();
    return sendForm(reply, status, peoplePage({ people: await this.people.all(actor), isFirst, refused }));
  }
}

import { Body, Controller, Delete, Get, Headers, HttpCode, Param, Post, Put, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import {
  type NewPersonGiven,
  newPersonSchema,
  type PersonChangeGiven,
  personChangeSchema,
} from '#libs/contract/people-schema.js';
import { Person } from '#libs/store/person.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { tagOf, versionSeen } from '../sites/version-tag.js';
import { type Actor, actorOf, CurrentActor } from './actor.js';
import { findPerson, showPerson } from './find-person.js';
import { Needs } from './needs.js';
import { People } from './people.js';

/** The people of an organisation, for its administrators. */
@Controller('api/people')
export class PeopleController {
  constructor(
    private readonly store: Store,
    private readonly people: People,
  ) {}

  @Get()
  @Needs('administrator', 'Lists the people of the organisation, closed accounts too.')
  async list(@CurrentActor() actor: Actor) {
    return { people: (await this.people.all(actor)).map(showPerson) };
  }

  @Post()
  @Needs('administrator', 'Opens an account; the first of all must be an administrator’s.')
  async open(
    @CurrentActor() actor: Actor,
    @Body({ schema: newPersonSchema, pipes: [new ContractPipe()] }) body: NewPersonGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const person = await this.people.open(actor, body);
    reply.header('location', `/api/people/${person.id}`);
    return answerWith(person, reply);
  }

  @Get(':personId')
  @Needs('administrator', 'Gives a person; the ETag is the version of the account.')
  async get(
    @CurrentActor() actor: Actor,
    @Param('personId') id: string,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    return answerWith(await findPerson(this.store, actor, id), reply);
  }

  @Put(':personId')
  @Needs('administrator', 'Changes name, role or password of an account that has the version named in If-Match.')
  async change(
    @Param('personId') id: string,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: personChangeSchema, pipes: [new ContractPipe()] }) body: PersonChangeGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const version = versionSeen(seen, true) ?? 0;
    return answerWith(await this.people.change(actorOf(reply.request), { id, version }, body), reply);
  }

  @Delete(':personId')
  @HttpCode(204)
  @Needs('administrator', 'Closes an account: its sessions end, its keys are revoked, its name stays under its work.')
  async close(
    @CurrentActor() actor: Actor,
    @Param('personId') id: string,
    @Headers('if-match') seen: string | undefined,
  ) {
    await this.people.close(actor, { id, version: versionSeen(seen, true) ?? 0 });
  }
}

function answerWith(person: Person, reply: FastifyReply) {
  reply.header('etag', tagOf(person.version));
  return showPerson(person);
}

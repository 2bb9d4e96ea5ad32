import { Injectable } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { newId } from '../platform/ids/ids.ts';
import { OPEN_INCIDENT } from './incidents.queries.ts';

/** A difference a person must look at; one row per kind and subject, however often it is noticed. */
@Injectable()
export class Incidents {
  constructor(private readonly uow: UnitOfWork) {}

  async open(tx: Tx, kind: string, subject: string, detail: string): Promise<void> {
    await this.uow.rows(tx, OPEN_INCIDENT, [newId(), kind, subject, detail]);
  }
}

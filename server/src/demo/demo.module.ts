import { Module } from '@nestjs/common';
import { PeopleModule } from '../people/people.module.ts';
import { DemoController } from './demo.controller.ts';
import { DemoPeople } from './demo-people.ts';

@Module({ imports: [PeopleModule], controllers: [DemoController], providers: [DemoPeople] })
export class DemoModule {}

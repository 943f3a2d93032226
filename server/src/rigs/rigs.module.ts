import { Module } from '@nestjs/common';
import { RigsController } from './rigs.controller';
import { RigsService } from './rigs.service';

@Module({ controllers: [RigsController], providers: [RigsService] })
export class RigsModule {}

import { Module } from '@nestjs/common';
import { CapturesModule } from '../captures/captures.module';
import { TodayController } from './today.controller';
import { TodayService } from './today.service';

@Module({ imports: [CapturesModule], controllers: [TodayController], providers: [TodayService] })
export class TodayModule {}

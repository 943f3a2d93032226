import 'reflect-metadata';
import { Readable } from 'node:stream';
import { NestFactory } from '@nestjs/core';
import { Logger } from 'nestjs-pino';
import { DataSource } from 'typeorm';
import { AppModule } from '../app.module';
import { CapturesService } from '../captures/captures.service';
import { Capture } from '../captures/capture.entity';
import type { UploadFieldsDto } from '../captures/dto/file-capture.dto';
import type { SignedInPerson } from '../common/actor';
import { readEnv } from '../config/env.schema';
import { dayOf } from '../rigs/calibration-state';
import { CalibrationsService } from '../rigs/calibrations.service';
import { RigCalibration } from '../rigs/rig-calibration.entity';
import { Rig } from '../rigs/rig.entity';
import { RigsService } from '../rigs/rigs.service';
import { ObjectStore } from '../storage/object-store';
import { receiveFile } from '../storage/receive-file';
import { ConditionsService } from '../units/conditions.service';
import { Unit } from '../units/unit.entity';
import { UnitsService } from '../units/units.service';
import { UnitCondition } from '../units/unit-condition.entity';
import { ensureDemoPeople } from './demo-people';
import { makeRecording } from './make-recording';
import { DEMO_RIGS, DEMO_UNITS, DEMO_UNSORTED, type DemoRig, type DemoTake, type DemoUnit } from './scenario';

const DAY_MS = 86_400_000;

function dayFromToday(days: number): string {
  return dayOf(new Date(Date.now() + days * DAY_MS));
}

/**
 * `node server/dist/demo/seed.js`: fills an empty bench. Every step looks first whether it was done, so that a run
 * that was cut off is finished by the next one, and what people changed since stays.
 */
class Seeder {
  constructor(
    private readonly context: Awaited<ReturnType<typeof NestFactory.createApplicationContext>>,
    private readonly reviewer: SignedInPerson,
  ) {}

  private get dataSource(): DataSource {
    return this.context.get(DataSource);
  }

  async fileRig({ rig, calibrations }: DemoRig): Promise<void> {
    const { name } = rig;
    const known = await this.dataSource.getRepository(Rig).findOneBy({ name });
    const rigId = known?.id ?? (await this.context.get(RigsService).create(rig, null)).id;
    for (const { facts, takenDaysAgo, validForDays } of calibrations) {
      const { range } = facts;
      if (await this.dataSource.getRepository(RigCalibration).existsBy({ rigId, range })) continue;
      const dated = {
        ...facts,
        takenOn: dayFromToday(-takenDaysAgo),
        validUntil: dayFromToday(validForDays - takenDaysAgo),
      };
      const by = { person: this.reviewer, actor: null };
      await this.context.get(CalibrationsService).create(rigId, dated, by);
    }
  }

  private async rigId(name: string): Promise<string> {
    return (await this.dataSource.getRepository(Rig).findOneByOrFail({ name })).id;
  }

  async fileUnit({ unit, conditions }: DemoUnit): Promise<void> {
    const { maker, model } = unit;
    const known = await this.dataSource.getRepository(Unit).findOneBy({ maker, model });
    const unitId = known?.id ?? (await this.context.get(UnitsService).create(unit)).id;
    for (const { condition, takes } of conditions) {
      const { name } = condition;
      const found = await this.dataSource.getRepository(UnitCondition).findOneBy({ unitId, name });
      const conditionId =
        found?.id ?? (await this.context.get(ConditionsService).create(unitId, condition)).id;
      for (const take of takes) await this.archive(take, { unitId, conditionId });
    }
  }

  async archive(take: DemoTake, filing: UploadFieldsDto): Promise<void> {
    const { fileName } = take;
    if (await this.dataSource.getRepository(Capture).existsBy({ fileName })) return;
    const store = this.context.get(ObjectStore);
    const file = await receiveFile(Readable.from(makeRecording(take)), store.tempFolder);
    await this.context.get(CapturesService).archive({
      file: { ...file, fileName },
      fields: { ...filing, rigId: await this.rigId(take.rig), note: take.note },
      person: this.reviewer,
      idempotencyKey: undefined,
    });
  }
}

async function main(): Promise<void> {
  const context = await NestFactory.createApplicationContext(AppModule.with(readEnv()), { bufferLogs: true });
  context.useLogger(context.get(Logger));
  try {
    const seeder = new Seeder(context, await ensureDemoPeople(context));
    for (const rig of DEMO_RIGS) await seeder.fileRig(rig);
    for (const unit of DEMO_UNITS) await seeder.fileUnit(unit);
    for (const take of DEMO_UNSORTED) await seeder.archive(take, {});
  } finally {
    await context.close();
  }
}

main().catch((error: unknown) => {
  process.stderr.write(`benchlark: the demo bench could not be filled: ${String(error)}\n`);
  process.exitCode = 1;
});

import { Global, Injectable, Module, Optional, type OnModuleInit } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { ReadinessRegistry } from '../health/readiness-registry';
import { ENV } from '../config/env.module';
import { createObjectStore } from './create-object-store';
import { EvidenceService } from './evidence.service';
import { ObjectStore } from './object-store';
import { SweepService } from './sweep.service';

/** Opens the store before the first request: a wrong or unmounted one ends the start. */
@Injectable()
class StorageOpener implements OnModuleInit {
  constructor(
    private readonly store: ObjectStore,
    private readonly dataSource: DataSource,
    // The worker answers no health requests and has none.
    @Optional() private readonly readiness?: ReadinessRegistry,
  ) {}

  async onModuleInit(): Promise<void> {
    const known: unknown[] = await this.dataSource.query('SELECT 1 FROM stored_object LIMIT 1');
    await this.store.open(known.length === 0);
    this.readiness?.add('storage', () => this.store.checkReady());
  }
}

@Global()
@Module({
  providers: [
    { provide: ObjectStore, inject: [ENV], useFactory: createObjectStore },
    StorageOpener,
    EvidenceService,
    SweepService,
  ],
  exports: [ObjectStore, EvidenceService, SweepService],
})
export class StorageModule {}

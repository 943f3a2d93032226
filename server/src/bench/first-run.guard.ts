import { Injectable, type CanActivate } from '@nestjs/common';
import { AppError } from '../common/app-error';
import { BenchService } from './bench.service';

/** A bench that has been set up has no such route, whatever is sent to it. */
@Injectable()
export class FirstRunGuard implements CanActivate {
  constructor(private readonly bench: BenchService) {}

  async canActivate(): Promise<boolean> {
    if (!(await this.bench.describe()).isFirstRun) throw new AppError('NOT_FOUND');
    return true;
  }
}

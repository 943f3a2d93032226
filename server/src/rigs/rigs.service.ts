import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { isUniqueViolation } from '../database/database-errors';
import type { CreateRigDto, RigDto } from './dto/rig.dto';
import { Rig } from './rig.entity';

/** The chains that units are measured with. */
@Injectable()
export class RigsService {
  constructor(private readonly dataSource: DataSource) {}

  async list(): Promise<RigDto[]> {
    const rigs = await this.dataSource.getRepository(Rig).find({ order: { name: 'ASC' } });
    return rigs.map(toRigDto);
  }

  async create({ name, notes = '' }: CreateRigDto): Promise<RigDto> {
    const rigs = this.dataSource.getRepository(Rig);
    try {
      const { identifiers } = await rigs.insert({ name, notes });
      return toRigDto(await rigs.findOneByOrFail({ id: (identifiers[0] as { id: string }).id }));
    } catch (error) {
      if (!isUniqueViolation(error, 'uq_rig_name')) throw error;
      throw new AppError('CONFLICT', {
        detail: 'There is a rig of this name already.',
        fields: { name: ['is taken by another rig'] },
      });
    }
  }
}

function toRigDto({ id, name, notes, createdAt }: Rig): RigDto {
  return { id, name, notes, createdAt: createdAt.toISOString() };
}

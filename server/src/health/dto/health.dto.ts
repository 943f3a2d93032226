import { ApiProperty } from '@nestjs/swagger';

export class LiveDto {
  @ApiProperty({ enum: ['ok'] })
  status!: 'ok';
}

export class ReadyDto {
  @ApiProperty({ enum: ['ready', 'not-ready', 'shutting-down'] })
  status!: 'ready' | 'not-ready' | 'shutting-down';

  @ApiProperty({
    type: 'object',
    additionalProperties: { type: 'string', enum: ['up', 'down'] },
    description: 'Each component by its name',
  })
  components!: Record<string, 'up' | 'down'>;
}

import { Controller, Get } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { Roles } from '../common/roles';
import { TodayDto } from './dto/today.dto';
import { TodayService } from './today.service';

@ApiTags('today')
@Controller('today')
export class TodayController {
  constructor(private readonly today: TodayService) {}

  @Get()
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: TodayDto })
  getToday(): Promise<TodayDto> {
    return this.today.get();
  }
}

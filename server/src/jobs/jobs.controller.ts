import { Controller, Delete, Get, HttpCode, Param, Post, Query } from '@nestjs/common';
import { ApiAcceptedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { AnalysisRequests } from './analysis-requests.service';
import { JobListDto, ListJobsQuery } from './dto/job.dto';
import { JobsService } from './jobs.service';

@ApiTags('jobs')
@Controller('jobs')
export class JobsController {
  constructor(
    private readonly jobs: JobsService,
    private readonly requests: AnalysisRequests,
  ) {}

  @Get()
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: JobListDto })
  async listJobs(@Query() query: ListJobsQuery): Promise<JobListDto> {
    return { items: await this.jobs.list(query) };
  }

  @Post(':id/retry')
  @HttpCode(202)
  @Roles('technician', 'reviewer', 'administrator')
  @ApiAcceptedResponse()
  retryJob(@Param('id', IdPipe) id: string): Promise<void> {
    return this.requests.retry(id);
  }

  @Delete(':id')
  @HttpCode(204)
  @Roles('technician', 'reviewer', 'administrator')
  @ApiNoContentResponse()
  cancelJob(@Param('id', IdPipe) id: string): Promise<void> {
    return this.jobs.cancel(id);
  }
}

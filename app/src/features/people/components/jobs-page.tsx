import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';
import { FormError, SelectInput } from '@/components/forms/field';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import { api, unwrap } from '@/lib/api-client';
import type { Job } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { formatBytes, formatCounted, formatPercent } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';
import { jobQueries } from '../api/people-queries';
import { PeopleFrame } from './people-frame';

const STATE_LABELS: Record<Job['state'], string> = {
  queued: 'waits',
  running: 'runs',
  done: 'done',
  failed: 'failed',
  cancelled: 'cancelled',
};
const STATES = Object.keys(STATE_LABELS) as Job['state'][];

/** The queue's work, and how much the store holds. */
export function JobsPage() {
  const [params, setParams] = useSearchParams();
  const state = STATES.find((one) => one === params.get('state')) ?? null;
  const jobs = useQuery(jobQueries.list(state));
  return (
    <PeopleFrame title="Jobs and storage" sub="What the analyser does, and what the store holds.">
      <Holdings />
      <div className="bl-people-words">
        <SelectInput
          label="Show"
          value={state ?? ''}
          options={[
            { value: '', label: 'all jobs' },
            ...STATES.map((value) => ({ value, label: `those: ${STATE_LABELS[value]}` })),
          ]}
          onChange={({ target }) =>
            setParams(target.value === '' ? {} : { state: target.value }, { replace: true })
          }
        />
      </div>
      {jobs.isPending && <LoadingState what="Fetching the jobs" />}
      {jobs.isError && (
        <FailedState
          what="The jobs could not be fetched."
          why={errorWords(jobs.error)}
          onRetry={() => void jobs.refetch()}
        />
      )}
      {jobs.data?.items.length === 0 && (
        <NoRows asked="No job fits.">The queue has nothing of this kind.</NoRows>
      )}
      {jobs.data && jobs.data.items.length > 0 && <JobTable jobs={jobs.data.items} />}
    </PeopleFrame>
  );
}

function Holdings() {
  const { data } = useQuery(captureQueries.some({ limit: 1 }));
  if (!data) return null;
  return (
    <p className="bl-people-holdings">
      {formatCounted(data.totalAll, 'capture')} in the archive, {formatBytes(data.totalBytes)} of recordings.
    </p>
  );
}

function JobTable({ jobs }: { jobs: readonly Job[] }) {
  const queryClient = useQueryClient();
  const refresh = () =>
    Promise.all([
      queryClient.invalidateQueries({ queryKey: jobQueries.all() }),
      queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
    ]);
  const retry = useMutation({
    mutationFn: (id: string) => unwrap(api.POST('/api/jobs/{id}/retry', { params: { path: { id } } })),
    onSettled: refresh,
  });
  const cancel = useMutation({
    mutationFn: (id: string) => unwrap(api.DELETE('/api/jobs/{id}', { params: { path: { id } } })),
    onSettled: refresh,
  });
  const error = retry.error ?? cancel.error;
  return (
    <>
      {error && <FormError>{errorWords(error)}</FormError>}
      <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Jobs">
        <table className="bl-table bl-jobs-table">
          <thead>
            <tr>
              <th scope="col">job</th>
              <th scope="col">asked for</th>
              <th scope="col">state</th>
              <th scope="col">tries</th>
              <th scope="col">
                <span className="bl-hidden">what can be done</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {jobs.map((job) => (
              <tr key={job.id}>
                <th scope="row">
                  {job.kind}, <Link to={`/captures/${job.captureId}`}>capture {job.captureNumber}</Link>
                </th>
                <td>{formatDateTime(job.createdAt)}</td>
                <td>
                  {STATE_LABELS[job.state]}
                  {job.state === 'running' && `, ${formatPercent(job.progress)}`}
                  {job.failure && <span className="bl-table-second">{job.failure.message}</span>}
                </td>
                <td>
                  {job.attempts} of {job.maxAttempts}
                </td>
                <td>
                  {(job.state === 'failed' || job.state === 'cancelled') && (
                    <button
                      type="button"
                      className="bl-word"
                      disabled={retry.isPending}
                      aria-label={`Try the analysis of capture ${job.captureNumber} again`}
                      onClick={() => retry.mutate(job.id)}
                    >
                      Try again
                    </button>
                  )}
                  {(job.state === 'queued' || job.state === 'running') && (
                    <button
                      type="button"
                      className="bl-word"
                      disabled={cancel.isPending}
                      aria-label={`Stop the analysis of capture ${job.captureNumber}`}
                      onClick={() => cancel.mutate(job.id)}
                    >
                      Stop it
                    </button>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}

import { Button, DropdownMenu } from '@radix-ui/themes';
import { Link } from 'react-router-dom';
import { PageHead } from '@/components/page/page-head';
import type { Crumb } from '@/components/page/page-head';
import type { Capture } from '@/lib/api-schema';
import { captureTitle, unitName } from '@/lib/capture-words';
import type { ServedRecordDetail } from '../api/record-queries';
import { EvidenceLine } from './evidence-line';
import { WarningBlock } from '@/components/page/page';

export interface CaptureHeadProps {
  capture: Capture;
  detail: ServedRecordDetail | null;
}

/** Title, where it is filed, downloads, and the evidence line. */
export function CaptureHead({ capture, detail }: CaptureHeadProps) {
  return (
    <>
      <PageHead
        title={captureTitle(detail ? { ...capture, record: detail } : capture)}
        crumbs={crumbsOf(capture)}
        actions={<Downloads capture={capture} recordId={detail?.id ?? null} />}
        line={<EvidenceLine capture={capture} record={detail ?? capture.record} />}
      />
      {detail?.supersededById && (
        <div className="bl-superseded">
          <WarningBlock
            lead={`Record ${detail.ordinal} is superseded.`}
            wayOut={<Link to={`/captures/${capture.id}`}>To the current record</Link>}
          >
            A newer analysis stands in its place; this one stays as it was.
          </WarningBlock>
        </div>
      )}
    </>
  );
}

function crumbsOf(capture: Capture): Crumb[] {
  const crumbs: Crumb[] = [{ label: 'Archive', to: '/archive' }];
  if (capture.unit) crumbs.push({ label: unitName(capture.unit), to: `/units/${capture.unit.id}` });
  else crumbs.push({ label: 'unsorted', to: '/archive?unit=none' });
  if (capture.condition) crumbs.push({ label: capture.condition.name });
  return crumbs;
}

function Downloads({ capture, recordId }: { capture: Capture; recordId: string | null }) {
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger>
        <Button variant="surface" color="gray" highContrast>
          Download
          <DropdownMenu.TriggerIcon />
        </Button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Content align="end">
        <DropdownMenu.Item asChild disabled={capture.evidence === 'missing'}>
          <a href={`/api/captures/${capture.id}/file`} download>
            The recording (WAV)
          </a>
        </DropdownMenu.Item>
        {recordId !== null && (
          <>
            <DropdownMenu.Item asChild>
              <a href={`/api/records/${recordId}/download?format=json`} download>
                The record (JSON)
              </a>
            </DropdownMenu.Item>
            <DropdownMenu.Item asChild>
              <a href={`/api/records/${recordId}/download?format=csv`} download>
                Its figures (CSV)
              </a>
            </DropdownMenu.Item>
          </>
        )}
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}

import { Button } from '@radix-ui/themes';
import { MarginBlock, WarningBlock } from '@/components/page/page';
import type { Verification } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatCounted } from '@/lib/format/quantity';
import { FormError } from '@/components/forms/field';
import { useVerify } from '../api/capture-actions';

const MOST_NAMED = 8;

/** Does the record still follow from the stored bytes? Asked of the server, answered in words. */
export function VerifyBlock({ captureId, recordId }: { captureId: string; recordId: string }) {
  const verify = useVerify(captureId);
  return (
    <MarginBlock title="Does it still hold?">
      <p className="bl-capture-keep">
        <Button
          variant="surface"
          color="gray"
          highContrast
          disabled={verify.isPending}
          onClick={() => verify.mutate(recordId)}
        >
          {verify.isPending ? 'Computing again' : 'Compute again and compare'}
        </Button>
      </p>
      <div role="status">{verify.data && <VerificationWords result={verify.data} />}</div>
      {verify.error && <FormError>{errorWords(verify.error)}</FormError>}
    </MarginBlock>
  );
}

function VerificationWords({ result }: { result: Verification }) {
  if (result.evidence === 'missing') {
    return (
      <WarningBlock tone="fault" lead="The stored bytes are gone.">
        Nothing can be computed again. The record itself is safe; restore the file from a backup.
      </WarningBlock>
    );
  }
  if (result.evidence === 'damaged') {
    return (
      <WarningBlock tone="fault" lead="The stored bytes are not those that were measured.">
        Their SHA-256 differs. The record itself is safe; restore the file from a backup.
      </WarningBlock>
    );
  }
  if (result.isEqual) {
    return <p>The bytes are unchanged and dsp {result.dspVersion} gives the same figures.</p>;
  }
  return (
    <WarningBlock lead={`${formatCounted(result.differing.length, 'figure')} came out otherwise`}>
      with dsp {result.dspVersion}:{' '}
      {result.differing.slice(0, MOST_NAMED).map(({ path, stored, computed }, index) => (
        <span key={path}>
          {index > 0 && '; '}
          <code>{path}</code> was {JSON.stringify(stored)}, is {JSON.stringify(computed)}
        </span>
      ))}
      .
    </WarningBlock>
  );
}

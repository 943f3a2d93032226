import type { RigCalibration } from '@/lib/api-schema';
import { formatDay } from '@/lib/format/date';
import { formatFrequency, formatPlain, formatSampleRate, withUnit } from '@/lib/format/quantity';
import { CHANNEL_WORDS, DIRECTION_WORDS, isStale, stateWords } from '../model/calibration-words';
import { dividerWords, formatVolts } from '../model/full-scale';

export interface CalibrationTableProps {
  calibrations: readonly RigCalibration[];
  /** Left out for whoever may not. */
  onRetire?: (calibration: RigCalibration) => void;
}

/** Every calibration that was ever made, newest first: none is changed, an old one is followed or retired. */
export function CalibrationTable({ calibrations, onRetire }: CalibrationTableProps) {
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of calibrations">
      <table className="bl-table bl-calibrations">
        <thead>
          <tr>
            <th scope="col">range</th>
            <th scope="col">state</th>
            <th scope="col">full scale</th>
            <th scope="col">holds for</th>
            <th scope="col">taken</th>
            {onRetire && (
              <th scope="col">
                <span className="bl-hidden">retire</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {calibrations.map((calibration) => (
            <CalibrationRow key={calibration.id} calibration={calibration} onRetire={onRetire} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

function CalibrationRow({
  calibration,
  onRetire,
}: {
  calibration: RigCalibration;
  onRetire?: (calibration: RigCalibration) => void;
}) {
  const { range, loadOhm, notes } = calibration;
  const percent = withUnit(formatPlain(calibration.meterUncertaintyPercent), '%');
  return (
    <tr>
      <th scope="row">
        {range}
        <span className="bl-table-second">
          {DIRECTION_WORDS[calibration.direction]}, {CHANNEL_WORDS[calibration.channel]}
        </span>
      </th>
      <td className={isStale(calibration) ? 'bl-rig-stale' : undefined}>{stateWords(calibration)}</td>
      <td>
        <span className="bl-calibrations-value">
          <span className="bl-mono">{formatVolts(calibration.fullScaleVrms)}</span> RMS
        </span>
        <span className="bl-table-second">±{percent}</span>
        <span className="bl-table-second">{dividerWords(calibration)}</span>
      </td>
      <td>
        {formatSampleRate(calibration.sampleRateHz)}
        <span className="bl-table-second">
          by a tone of {formatFrequency(calibration.frequencyHz)}
          {loadOhm !== null && ` into ${withUnit(formatPlain(loadOhm), 'Ω')}`}
        </span>
      </td>
      <td>
        {formatDay(calibration.takenOn)}
        <span className="bl-table-second">
          {calibration.meter}, {calibration.createdBy.displayName}
        </span>
        {notes !== '' && <span className="bl-table-second">{notes}</span>}
      </td>
      {onRetire && (
        <td>
          {calibration.state !== 'retired' && (
            <button
              type="button"
              className="bl-word"
              aria-label={`Retire the calibration of ${range}, ${DIRECTION_WORDS[calibration.direction]}, ${CHANNEL_WORDS[calibration.channel]}, taken on ${formatDay(calibration.takenOn)}`}
              onClick={() => onRetire(calibration)}
            >
              Retire
            </button>
          )}
        </td>
      )}
    </tr>
  );
}

'use client';

import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatBandwidth, formatFrequency, formatFrequencyMhz, formatFrequencyRange } from '@/format/frequencies';
import { ABSENT, formatAzimuth, formatDb, formatHeight, formatMargin, unitLabel } from '@/format/quantities';
import { capitalised, DETECTOR_MARKS, DETECTOR_WORDS } from '@/format/words';
import type { LineDetector } from '@/schemas/common';
import type { AskedFinal, JudgedReading } from '@/schemas/finals';
import { FinalCell } from './FinalCell';
import { isRead, NOTHING_TYPED, tunedApart, wrongIn, type TypedRow } from './typedFinals';

interface Props {
  asked: AskedFinal;
  typed: TypedRow | undefined;
  /** The columns of levels of this position. */
  detectors: readonly LineDetector[];
  /** `dBµV`, as the readings are. */
  unit: string;
  /** Whether an antenna has a height and the turntable an azimuth. */
  radiated: boolean;
  judged: readonly JudgedReading[] | null;
  /** What the server refused of it. */
  refused: string | null;
  onType: (key: string, row: TypedRow) => void;
}

/** One emission: what is asked, the cells, and below them what the readings come to. */
export function FinalRow({ asked, typed, detectors, unit, radiated, judged, refused, onType }: Props) {
  const row = typed ?? NOTHING_TYPED;
  const wrong = wrongIn(row, asked);
  const at = formatFrequency(asked.frequencyHz);
  const type = (change: Partial<TypedRow>) => onType(asked.key, { ...row, ...change });
  const level = (detector: LineDetector) => (text: string) =>
    type({ levels: { ...row.levels, [detector]: text }, readAt: new Date().toISOString() });
  const prefilled = formatFrequencyMhz(asked.frequencyHz);
  const apart = isRead(typed) ? tunedApart(row, asked) : null;
  return (
    <li className="final">
      <div className="final-asked">
        <span className="t-figure font-semibold">
          {asked.kind === 'floor' ? formatFrequencyRange(asked.fromHz, asked.toHz) : at}
        </span>
        <span className="t-detail block">
          {asked.retests.map((retest) => (
            <span key={retest.id} className="block">
              <span className="t-id">{retest.number}</span> {DETECTOR_MARKS[retest.detector]}{' '}
              {retest.reason === 'over' ? 'over' : 'needs a final'}, {formatMargin(retest.marginDb)}
            </span>
          ))}
        </span>
      </div>
      <FinalCell
        cell="frequency"
        label="Tuned to"
        of={`for ${at}`}
        unit="MHz"
        value={row.frequency ?? prefilled}
        cleared={prefilled}
        wrong={wrong.frequency}
        onChange={(text) => type({ frequency: text === prefilled ? undefined : text })}
      />
      {detectors.map((detector) =>
        asked.detectors.includes(detector) ? (
          <FinalCell
            key={detector}
            cell={detector}
            label={capitalised(DETECTOR_WORDS[detector])}
            of={`at ${at}, in ${unit}`}
            unit={unit}
            value={row.levels[detector] ?? ''}
            wrong={wrong[detector]}
            onChange={level(detector)}
          />
        ) : (
          <span key={detector} className="final-cell final-none" aria-hidden />
        ),
      )}
      {radiated && (
        <>
          <FinalCell
            cell="height"
            label="Height"
            of={`of the antenna at ${at}, in m`}
            unit="m"
            value={row.height}
            last={asked.heightM === null ? undefined : formatHeight(asked.heightM)}
            wrong={wrong.height}
            onChange={(height) => type({ height })}
          />
          <FinalCell
            cell="azimuth"
            label="Azimuth"
            of={`at ${at}, in degrees`}
            unit="°"
            value={row.azimuth}
            last={asked.azimuthDeg === null ? undefined : formatAzimuth(asked.azimuthDeg)}
            wrong={wrong.azimuth}
            onChange={(azimuth) => type({ azimuth })}
          />
        </>
      )}
      <FinalCell
        cell="remark"
        label="Remark"
        of={`at ${at}`}
        text
        value={row.remark}
        onChange={(remark) => type({ remark })}
      />
      <div className="final-says" aria-live="polite">
        {judged?.map((one) => (
          <Judged key={one.detector} reading={one} />
        ))}
        {apart && <p className="text-ochre">Tuned {apart}.</p>}
        {refused && <p className="text-madder">This final {refused}.</p>}
        {!isRead(typed) && <p className="t-detail">{askedWords(asked)}</p>}
      </div>
    </li>
  );
}

function askedWords({ retests, detectors, rbwHz }: AskedFinal): string {
  const named = new Set(retests.map(({ detector }) => detector));
  const words = detectors.filter((one) => named.has(one)).map((one) => DETECTOR_WORDS[one]);
  const limits = retests.map(({ limit, unit }) => `${formatDb(limit)} ${unitLabel(unit)}`);
  return `${capitalised(words.join(' and '))} in ${formatBandwidth(rbwHz)}, limit ${[...new Set(limits)].join(' and ')}`;
}

function Judged({ reading }: { reading: JudgedReading }) {
  const { detector, level, unit, limit, marginDb, verdict, because } = reading;
  return (
    <p>
      <VerdictWord verdict={verdict} />{' '}
      <span className="t-figure">
        {DETECTOR_MARKS[detector]} {level === null ? ABSENT : `${formatDb(level)} ${unit ? unitLabel(unit) : ''}`}
        {limit !== null && `, limit ${formatDb(limit)}`}
        {marginDb !== null && (
          <>
            , <span className="font-semibold">{formatMargin(marginDb)}</span>
          </>
        )}
      </span>
      {because && <span className="t-detail block">{because}</span>}
    </p>
  );
}

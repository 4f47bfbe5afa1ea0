import { useMemo } from 'react';
import { useNavigate } from 'react-router-dom';
import type { ChartContent } from '../../shared/drawing/chart-input.js';
import { text } from '../../shared/text.js';
import { ButtonLink } from '../components/button.js';
import { SweepChart } from '../components/chart/sweep-chart.js';
import { DropArea } from '../components/drop-area.js';
import { DropPage } from '../components/drop-page.js';
import { PageFrame } from '../components/page-frame.js';
import { handFiles } from '../lib/handed-files.js';
import { usePreferences } from '../lib/preferences.js';
import { samplePoints } from '../lib/sample-driver.js';
import { useSessionState } from '../lib/session.js';

/** One sentence, one drop area, one curve. */
export function Component() {
  const navigate = useNavigate();
  const { hint } = useSessionState();
  const unpack = (files: File[]) => {
    handFiles(files);
    void navigate('/try');
  };
  return (
    <DropPage onFiles={unpack}>
      <PageFrame title={text.common.startSentence} isTitleHidden>
        <div className="grid items-center gap-8 lg:min-h-[calc(100dvh-8rem)] lg:grid-cols-[5fr_7fr] lg:gap-12">
          <div className="flex flex-col gap-6">
            <p
              aria-hidden
              className="text-[2.25rem] leading-[1.15] font-[650] text-balance [font-variation-settings:'SHRP'_100] sm:text-[2.75rem]"
            >
              {text.common.startSentence}
            </p>
            <p className="max-w-prose text-read text-soft">{text.common.startMore}</p>
            <DropArea label={text.unpack.chooseLabel} onFiles={unpack} className="min-h-40" />
            <p className="flex flex-wrap gap-2">
              <ButtonLink to="/try?sample" look="plain">
                {text.common.openSample}
              </ButtonLink>
              {hint ? (
                <ButtonLink to="/home" look="quiet">
                  {text.common.home}
                </ButtonLink>
              ) : (
                <ButtonLink to="/register" look="quiet">
                  {text.common.makeAccount}
                </ButtonLink>
              )}
            </p>
          </div>
          <SampleChart />
        </div>
      </PageFrame>
    </DropPage>
  );
}

function SampleChart() {
  const { locale } = usePreferences();
  const content = useMemo(
    (): ChartContent => ({
      sweeps: [{ id: 'sample', name: text.common.sampleName, lineNumber: 1, points: samplePoints() }],
    }),
    [],
  );
  return (
    <div className="min-w-0">
      <SweepChart
        content={content}
        className="h-[26rem] w-full sm:h-[30rem]"
        controls="none"
        twins="below"
        {...(locale ? { locale } : {})}
      />
      <p className="mt-3 text-note text-soft">{text.common.sampleCaption}</p>
    </div>
  );
}

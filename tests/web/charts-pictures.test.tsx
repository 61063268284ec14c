/** What the pictures draw: marks, not pixels. */
import type { ReactElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { Cord, cordText } from '../../web/charts/cord/cord.tsx';
import { CordLegend } from '../../web/charts/cord/cord-legend.tsx';
import { cordRuns, cordScale } from '../../web/charts/cord/geometry.ts';
import { IntervalMarks } from '../../web/charts/intervals/intervals.tsx';
import { RatioMarks } from '../../web/charts/ratio/ratio-bars.tsx';
import { ratioScale } from '../../web/charts/ratio/ratio-scale.ts';
import { ResidualMarks, residualDomain } from '../../web/charts/residuals/residuals.tsx';
import { layoutOf } from '../../web/charts/spaghetti/layout.ts';
import { SpaghettiMarks } from '../../web/charts/spaghetti/marks.tsx';
import { nearestIn, spotsOf } from '../../web/charts/spaghetti/nearest.ts';
import { outlyingOf, ribbonsOf } from '../../web/charts/spaghetti/ribbons.ts';
import { SuccessiveMarks, successivePairs } from '../../web/charts/variogram/successive.tsx';
import { VariogramMarks } from '../../web/charts/variogram/variogram.tsx';
import {
  bins,
  cordVisits,
  pictureOf,
  residuals,
  six,
  spaghettiOf,
  stampWords,
  subjectOf,
} from './charts-data.ts';

const size = { width: 640, height: 400 };
const idle = { as: 'readings', many: null, picked: null, hovered: null } as const;

/** Markup with whole pixels: a hundredth of one is no change of the picture. Words stay as they are. */
function drawn(element: ReactElement): string {
  const whole = (figure: string) =>
    Math.abs(Number(figure)) < 1 ? figure : String(Math.round(Number(figure)));
  return renderToStaticMarkup(element)
    .replace(/<[^>]+>/g, (tag) => tag.replace(/-?\d+\.\d+/g, whole))
    .replace(/></g, '>\n<');
}

describe('the cord', () => {
  const scale = cordScale([{ visits: cordVisits }]);

  it('draws a knot for each state', () => {
    expect(drawn(<Cord visits={cordVisits} today={190} scale={scale} />)).toMatchSnapshot();
    expect(drawn(<CordLegend />)).toMatchSnapshot();
  });

  it('says in words what it draws', () => {
    expect(cordText(cordVisits, null)).toBe(
      '8 visits: 2 done, 1 partly done, 1 missed (Week 18), 1 overdue (Week 24), 1 open (Week 28), 1 upcoming, 1 unscheduled, 1 out of window.',
    );
  });

  it('is solid until today and dotted after', () => {
    const runs = cordRuns(cordVisits, 126, null, { from: 0, to: 252 });
    expect(runs).toEqual({ solid: { from: 0, to: 50 }, dotted: { from: 50, to: 100 } });
  });

  it('ends where follow-up ended and shows nothing as upcoming after it', () => {
    const markup = drawn(
      <Cord
        visits={cordVisits}
        today={190}
        endedAt={100}
        endWord="lost to follow-up"
        scale={scale}
      />,
    );
    expect(markup).toContain('lost to follow-up');
    expect(markup).not.toContain('upcoming');
    expect(cordRuns(cordVisits, 190, 100, scale).dotted).toBeNull();
  });
});

describe('the spaghetti plot', () => {
  it('draws every subject, the pooled line and the number at each visit', () => {
    const markup = drawn(<SpaghettiMarks data={six} size={size} state={idle} stamp={null} />);
    expect(markup).toMatchSnapshot();
    expect(markup).toContain('pooled line');
    expect(markup).toContain('sway path, cm');
    expect(markup).toContain('weeks since baseline');
  });

  it('draws own lines, dashed where they go through two readings', () => {
    const state = { ...idle, as: 'own lines' } as const;
    const markup = drawn(<SpaghettiMarks data={six} size={size} state={state} stamp={null} />);
    expect(markup.match(/stroke-dasharray="5 4"/g)).toHaveLength(1);
  });

  it('draws the picked subject in full ink with its code', () => {
    const state = { ...idle, picked: 'id-3' };
    expect(drawn(<SpaghettiMarks data={six} size={size} state={state} stamp={null} />)).toContain(
      'AL103</text>',
    );
  });

  it('fades the line where fewer than five subjects remain', () => {
    const few = spaghettiOf([0, 1, 2, 3, 4].map((index) => subjectOf(index, index === 4 ? 2 : 4)));
    const markup = drawn(<SpaghettiMarks data={few} size={size} state={idle} stamp={null} />);
    expect(markup).toContain('<g opacity="0.35">');
    const full = drawn(<SpaghettiMarks data={six} size={size} state={idle} stamp={null} />);
    expect(full).not.toContain('<g opacity');
  });

  it('shows ribbons and the furthest subjects by name once there are many', () => {
    const many = spaghettiOf([
      ...Array.from({ length: 420 }, (_, index) => ({ ...subjectOf(index % 6), id: `m${index}` })),
      { ...subjectOf(40), id: 'far', code: 'FAR1' },
    ]);
    expect(outlyingOf(many)).toEqual(['far']);
    expect(ribbonsOf(many)[0]).toMatchObject({ time: 0, n: 421, lower: 22, middle: 26, upper: 28 });
    const state = { ...idle, many: 'ribbons' } as const;
    const markup = drawn(<SpaghettiMarks data={many} size={size} state={state} stamp={null} />);
    expect(markup).toContain('FAR1</text>');
    expect(markup.match(/<path/g)?.length).toBeLessThan(20);
  });

  it('finds the subject under the pointer, between readings too', () => {
    const layout = layoutOf(six, size, false);
    const spots = spotsOf(six.subjects, 'own lines', layout);
    expect(nearestIn(spots, layout.x(6), layout.y(24 - 0.6))).toBe('id-2');
    expect(nearestIn(spots, layout.left - 40, layout.top - 20)).toBeNull();
  });

  it('keeps one reading, one time and a constant within its bounds', () => {
    const one = { ...subjectOf(0, 1), ended: null };
    const data = { ...spaghettiOf([one]), visits: [], lines: [] };
    const markup = drawn(<SpaghettiMarks data={data} size={size} state={idle} stamp={null} />);
    expect(markup).not.toContain('NaN');
    expect(markup).toMatch(/<path d="M\d+,\d+Z?h0"/);
  });
});

describe('the pictures of the check', () => {
  const domain = residualDomain(residuals);
  const base = { domain, unit: 'cm', picked: null, onPick: () => undefined };

  it('draws residuals by subject, in flare only where they are tethered', () => {
    const marks = (tethered: boolean) =>
      drawn(
        <ResidualMarks
          {...base}
          subjects={residuals}
          tethered={tethered}
          picture={pictureOf(null)}
          size={size}
        />,
      );
    expect(marks(true)).toMatchSnapshot();
    expect(marks(true)).toContain('--color-flare');
    expect(marks(false)).not.toContain('--color-flare');
  });

  it('draws the variogram with its pairs and the labelled total', () => {
    const markup = drawn(
      <VariogramMarks
        picture={pictureOf(null)}
        bins={bins}
        total={9}
        unit="cm"
        timeUnit="weeks"
        tethered={true}
        size={size}
      />,
    );
    expect(markup).toMatchSnapshot();
    expect(markup).toContain('total variance, between subjects 9.0');
  });

  it('pairs each residual with the next one, less the mean of its subject', () => {
    expect(successivePairs(residuals).map(({ now, next }) => [now, next])).toEqual([
      [-1, 0],
      [0, 1],
      [-0.5, 0.5],
    ]);
    expect(
      drawn(
        <SuccessiveMarks
          picture={pictureOf(null)}
          pairs={successivePairs(residuals)}
          unit="cm"
          picked="id-0"
          size={size}
        />,
      ),
    ).toMatchSnapshot();
  });

  it('draws ratios on a log scale that clips nothing', () => {
    const scale = ratioScale([0.3, 5.2, null]);
    expect(scale.ticks.map((tick) => tick.text)).toEqual(['¼', '½', '1', '2', '4', '8']);
    expect(scale.place(0.25)).toBe(0);
    expect(scale.place(8)).toBe(100);
    const rows = [
      { name: 'Level', ratio: 1.5, moulton: 2.1 },
      { name: 'Trend', ratio: 0.5, moulton: null },
    ];
    expect(
      drawn(<RatioMarks picture={pictureOf(null)} rows={rows} size={size} />),
    ).toMatchSnapshot();
  });

  it('draws an interval without an end as an arrow and says so', () => {
    const rows = [
      {
        method: 'Pooled',
        estimate: -0.1,
        lower: -0.2,
        upper: -0.02,
        error: 0.04,
        chief: true,
        note: '',
      },
      {
        method: 'Wild',
        estimate: -0.1,
        lower: null,
        upper: -0.01,
        error: 0.04,
        chief: false,
        note: '',
      },
    ];
    const markup = drawn(
      <IntervalMarks picture={pictureOf(stampWords)} rows={rows} unit="cm a week" size={size} />,
    );
    expect(markup).toMatchSnapshot();
    expect(markup).toContain('unbounded to −0.010');
  });
});

/**
 * Questions 5 and 6: when can I enter, and which levels, how sure?
 * @module
 */
import { caution } from '../../caution.js';
import { drawLevelsLadder } from '../../levels-ladder.js';
import { drawMonth } from '../../month-picture.js';
import { drawWeek } from '../../week.js';
import { conditionText, windowsByDay, windowText } from '../../windows-text.js';
import { type Child, element } from '../markup.js';
import { monthSpan } from '../month.js';
import { counted, duration, metres } from '../numbers.js';
import { wallText, zoneText } from '../zone.js';
import { type Facts, momentIn, openTimes } from './facts.js';
import { cautionBox, figure, paragraph, type Question, soft } from './page.js';

function monthParts({ input, zone, datum, place, month }: Facts): Child {
  if (month === undefined)
    return paragraph('No high and low waters were given, so there is no month of tides.');
  const { from, to, wall } = monthSpan(month, zone);
  const here = input.windows?.list.filter((window) => window.to > from && window.from < to);
  const listed = here?.filter((window) => window.from >= from);
  const name = wallText('%B %Y', wall);
  return [
    figure((options) =>
      drawMonth(
        {
          place,
          turningPoints: input.turningPoints,
          month,
          timeZone: input.timeZone,
          datum,
          sky: input.sky,
          windows: here,
        },
        options,
      ),
    ),
    listed &&
      listed.length > 0 && [
        element('h3', {}, `Windows of ${name}`),
        soft(
          `${counted(listed.length, 'window')} begin in ${name}, ${duration(openTimes(listed).all)} open together; times ${zoneText(zone, from, to)}`,
        ),
        element(
          'ul',
          { class: 'days' },
          windowsByDay(listed, zone).map(([day, windows]) =>
            element(
              'li',
              {},
              element('b', {}, day),
              element(
                'span',
                {},
                windows.map((window, i) => [i > 0 && element('br', {}), windowText(window, zone)]),
              ),
            ),
          ),
        ),
      ],
  ];
}

export function entering(facts: Facts): Question {
  const { input, zone, datum, place } = facts;
  const { windows, weekHeights, turningPoints } = input;
  const asked = windows
    ? `The condition is a predicted height ${conditionText(windows)} above ${datum}, searched from ${momentIn(zone, windows.from)} to ${momentIn(zone, windows.to)}.`
    : 'No condition was asked for: these are the predicted high and low waters.';
  const body: Child = [
    paragraph(asked),
    weekHeights &&
      figure((options) =>
        drawWeek(
          {
            heights: weekHeights,
            turningPoints,
            windows: windows?.list,
            above: windows?.above,
            below: windows?.below,
            timeZone: input.timeZone,
            datum,
            title: `A week at ${place}`,
          },
          options,
        ),
      ),
    monthParts(facts),
    cautionBox(caution('windows')),
  ];
  return { title: 'When can I enter?', body };
}

export function levelsHere({ input, zone, datum, place }: Facts): Question {
  const title = 'Which levels, and how sure?';
  const { levels, limits } = input;
  const extremes =
    limits &&
    paragraph(
      `The highest predicted tide, ${metres(limits.HAT.height)} m, comes on ${momentIn(zone, limits.HAT.time)}; the lowest, ${metres(limits.LAT.height)} m, on ${momentIn(zone, limits.LAT.time)}.`,
    );
  const ladder =
    levels && levels.length > 0
      ? figure((options) =>
          drawLevelsLadder({ rungs: levels, datum, title: `Levels at ${place}` }, options),
        )
      : paragraph('No levels were worked out.');
  return { title, body: [extremes, ladder, cautionBox(caution('levels'))] };
}

import arrowDown from 'lucide-static/icons/arrow-down.svg?raw';
import arrowLeft from 'lucide-static/icons/arrow-left.svg?raw';
import arrowLeftRight from 'lucide-static/icons/arrow-left-right.svg?raw';
import arrowRight from 'lucide-static/icons/arrow-right.svg?raw';
import arrowUp from 'lucide-static/icons/arrow-up.svg?raw';
import calendarDays from 'lucide-static/icons/calendar-days.svg?raw';
import calendarRange from 'lucide-static/icons/calendar-range.svg?raw';
import chartGantt from 'lucide-static/icons/chart-gantt.svg?raw';
import check from 'lucide-static/icons/check.svg?raw';
import circleAlert from 'lucide-static/icons/circle-alert.svg?raw';
import circleQuestionMark from 'lucide-static/icons/circle-question-mark.svg?raw';
import circleUserRound from 'lucide-static/icons/circle-user-round.svg?raw';
import house from 'lucide-static/icons/house.svg?raw';
import plus from 'lucide-static/icons/plus.svg?raw';
import printer from 'lucide-static/icons/printer.svg?raw';
import satelliteDish from 'lucide-static/icons/satellite-dish.svg?raw';
import search from 'lucide-static/icons/search.svg?raw';
import sunMoon from 'lucide-static/icons/sun-moon.svg?raw';
import trash from 'lucide-static/icons/trash-2.svg?raw';
import triangleAlert from 'lucide-static/icons/triangle-alert.svg?raw';
import undo from 'lucide-static/icons/undo-2.svg?raw';
import upload from 'lucide-static/icons/upload.svg?raw';

const icons = {
  arrowDown,
  arrowLeft,
  arrowLeftRight,
  arrowRight,
  arrowUp,
  calendarDays,
  calendarRange,
  chartGantt,
  check,
  circleAlert,
  circleQuestionMark,
  circleUserRound,
  house,
  plus,
  printer,
  satelliteDish,
  search,
  sunMoon,
  trash,
  triangleAlert,
  undo,
  upload,
};

export type IconName = keyof typeof icons;

/** An icon that accompanies a word; screen readers pass over it. */
export function Icon({ name }: { name: IconName }) {
  return (
    <span className="icon" aria-hidden="true" dangerouslySetInnerHTML={{ __html: icons[name] }} />
  );
}

import type { CourseData } from '@/components/course/course-data';
import type { CourseView } from '@/lib/queries/trial/course-of-doses';
import { unitText } from '@/lib/schemas/units';

/** The course as the drawing takes it. */
export function courseData(view: CourseView): CourseData {
  const { doses } = view;
  return {
    unit: unitText(view.unit),
    scale: view.scale,
    notation: view.doseNotation,
    ...(doses.kind === 'levels'
      ? { levels: doses.levels }
      : { range: { minimum: doses.lowest, maximum: doses.highest } }),
    cohorts: view.cohorts,
    ...(view.proposed ? { proposed: view.proposed } : {}),
    labels: view.labels,
  };
}

// The section Pictures: the zone ladder and its figures as a table.

import type { PlanFigures } from '../figures';
import { ladderLayout } from '../ladder/layout';
import { ladderPicture } from '../ladder/picture';
import { stepThroughBands } from '../ladder/stepping';
import { WHOLE } from '../ladder/view';
import { tableSection } from '../page';
import type { MakeSection } from '../section';
import { slot } from '../slot';
import { headline } from '../words';

export const picturesSection: MakeSection = ({ document }) => {
  const place = document.createElement('div');
  const picture = slot(document, 'picture');
  const figures = slot(document, 'rows');
  const stepping = stepThroughBands(document, picture.place, () => {});
  place.append(stepping.readout, picture.place, figures.place);

  let drawn: PlanFigures | null = null;
  function draw(): void {
    const able = drawn !== null && drawn.bands.length > 0 ? drawn : null;
    const layout = able && ladderLayout(able, picture.place.clientWidth, WHOLE);
    picture.show(layout ? [ladderPicture(layout, headline(able!).verdict)] : []);
    stepping.renew();
  }
  const sizes = new document.defaultView!.ResizeObserver(draw);
  sizes.observe(picture.place);

  return {
    title: 'Pictures',
    place,
    show(now) {
      drawn = now;
      figures.show(now.rows.length > 0 ? [tableSection(now)] : []);
      draw();
    },
    close: () => sizes.disconnect(),
  };
};

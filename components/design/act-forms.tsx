'use client';

import dynamic from 'next/dynamic';

/* The forms of the acts on a design, each fetched only where it is offered: whoever reads a design gets none of them. */

export const SubmitDesign = dynamic(() =>
  import('./submit-design-form').then((module) => module.SubmitDesignForm),
);
export const ApproveDesign = dynamic(() =>
  import('./approve-design-form').then((module) => module.ApproveDesignForm),
);
export const ReturnDesign = dynamic(() =>
  import('./return-design-form').then((module) => module.ReturnDesignForm),
);

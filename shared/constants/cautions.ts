/** Shown on the capture page, in e-mails and in records. */
export const cautionText =
  'Screening is an aid. A recording cannot prove the absence of aliasing by itself. Decisions about the safety of people or plant rest with the responsible engineer and with the applicable standards and local rules.';

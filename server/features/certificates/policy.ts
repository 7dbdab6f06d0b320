import { everyRole, type Policy } from '../../http/authorise.ts';

/** Certificates travel with what they certify, so that whoever may see lots and instruments may open them. */
export const certificatePolicy = {
  read: everyRole,
  upload: ['manager'],
} satisfies Policy;

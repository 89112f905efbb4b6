import 'server-only';
import { trialFormSchemas } from '@/lib/schemas/trial-forms';
import { type TrialCommandType } from '@/lib/schemas/trial-inputs';
import { hidden } from './hidden';
import { answered, jsonOf, routeReader, type RouteHandler } from './route';
import { parseTrialForm, performTrialForm } from './trial-form';

const isCommand = (type: string): type is TrialCommandType => Object.hasOwn(trialFormSchemas, type);

/**
 * The route over the same path as the forms' actions: a stored draft is sent again with its first submission key, which
 * a server action could not take (its id changes with each build). The body is the form's, without `trialCode`.
 */
export const trialCommandRoute: RouteHandler = (request, context) =>
  answered(request, async (seen) => {
    const reader = await routeReader(request);
    seen(reader);
    const { code = '', type = '' } = await context.params;
    if (!isCommand(type)) throw hidden();
    const body = await jsonOf(request);
    const input =
      typeof body === 'object' && body !== null && !Array.isArray(body) ? { ...body, trialCode: code } : body;
    return performTrialForm(reader, parseTrialForm(type, input));
  });

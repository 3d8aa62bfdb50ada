import type { RequestHandler } from 'express';
import type { Database } from '../database/database';
import { loadVisitor } from '../services/load-visitor';
import './session-types';

/** Finds out who sent the request, anew for each one: a changed role or a removed account counts at once. */
export function identifyVisitor(database: Database): RequestHandler {
  return async (request, response, next) => {
    const userId = request.user?.id;
    if (userId !== undefined) {
      response.locals['visitor'] = await loadVisitor(database, userId, request.session.workshopId);
    }
    next();
  };
}

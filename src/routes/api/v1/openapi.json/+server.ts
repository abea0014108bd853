import { json } from '@sveltejs/kit';
import { apiDocument } from '$lib/server/api/document';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = () => json(apiDocument());

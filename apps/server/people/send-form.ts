import type { FastifyReply } from 'fastify';

/** Sends a page with a form: never from a cache, and named as the sender of what is typed into it. */
export function sendForm(reply: FastifyReply, status: number, page: string) {
  return reply
    .status(status)
    .type('text/html; charset=utf-8')
    .header('cache-control', 'no-store')
    .header('referrer-policy', 'same-origin')
    .send(page);
}

import type { IncomingMessage, Server as HttpServer } from 'node:http';
import type { RequestHandler } from 'express';
import type { Logger } from 'pino';
import { Server, type Socket } from 'socket.io';
import { isClinician, isStaff } from '#shared/access/permissions.ts';
import { hintEvent, sessionEndedEvent, type Hint } from '#shared/realtime/hints.ts';
import type { Identity } from '../app.ts';
import type { Pools } from '../db/pools.ts';
import { withTx } from '../db/with-tx.ts';
import { loadPersonActor, recordsOf } from '../features/accounts/queries.ts';
import { liveSession, type SignedIn } from '../http/sessions.ts';
import type { Announcement, Audience } from './announce.ts';

const rooms = {
  session: (id: string) => `session:${id}`,
  person: (id: string) => `person:${id}`,
  patient: (id: string) => `patient:${id}`,
  clinicians: (clinicId: string) => `clinicians:${clinicId}`,
};

const roomFor = (to: Audience): string => {
  if ('person' in to) return rooms.person(to.person);
  return 'patient' in to ? rooms.patient(to.patient) : rooms.clinicians(to.clinicians);
};

type SocketData = { sessionId: string };
type ServerEvents = { [hintEvent]: (hint: Hint) => void; [sessionEndedEvent]: () => void };
type Sockets = Server<Record<string, never>, ServerEvents, Record<string, never>, SocketData>;
type OpenSocket = Socket<Record<string, never>, ServerEvents, Record<string, never>, SocketData>;

/** Sessions end by themselves too; open sockets are looked at this often. */
const revalidateEveryMs = 10_000;

/** Runs Express middleware on the handshake alone; later packets of the same connection carry a `sid`. */
const onHandshake =
  (middleware: RequestHandler) =>
  (
    req: IncomingMessage & { _query?: Record<string, string> },
    res: unknown,
    next: (error?: unknown) => void,
  ): void => {
    if (req._query?.sid === undefined) middleware(req as never, res as never, next);
    else next();
  };

/** Socket.IO over the same sessions as HTTP. It carries hints to this web's own sockets and takes no orders. */
export const openSockets = (
  server: HttpServer,
  {
    pools,
    clock,
    publicUrl,
    identity,
    log,
  }: { pools: Pools; clock: () => Date; publicUrl: string; identity: Identity; log: Logger },
) => {
  const { origin } = new URL(publicUrl);
  const io: Sockets = new Server(server, {
    serveClient: false,
    allowRequest: (req, decide) =>
      decide(null, req.headers.origin === undefined || req.headers.origin === origin),
  });
  for (const middleware of [identity.session, identity.initialize, identity.restore]) {
    io.engine.use(onHandshake(middleware));
  }

  /** The rooms that a session's person may be in now; null where it opens nothing any more. */
  const roomsFor = async (session: SignedIn): Promise<string[] | null> => {
    const person = { kind: 'person', clinicId: session.clinicId, personId: session.personId } as const;
    return withTx(pools.app, person, async (tx) => {
      const actor = await loadPersonActor(tx, person);
      if (!actor || (isStaff(actor.roles) && session.secondFactor === null)) return null;
      const records = await recordsOf(tx, actor, clock());
      return [
        rooms.session(session.sessionId),
        rooms.person(actor.personId),
        ...(isClinician(actor.roles) ? [rooms.clinicians(actor.clinicId)] : []),
        ...records.map((patientId) => rooms.patient(patientId)),
      ];
    });
  };

  io.use((socket, next) => {
    const session = (socket.request as IncomingMessage & { user?: Express.User }).user?.session;
    if (!session) {
      next(new Error('not-signed-in'));
      return;
    }
    roomsFor(session).then(
      async (allowed) => {
        if (!allowed) return next(new Error('not-signed-in'));
        socket.data.sessionId = session.sessionId;
        await socket.join(allowed);
        next();
      },
      () => next(new Error('unavailable')),
    );
  });

  // Session or rights may have ended between the handshake and the join; nothing that was revoked stays.
  io.on('connection', (socket) => void judgeAnew(socket));

  const end = (socket: OpenSocket): void => {
    socket.emit(sessionEndedEvent);
    socket.disconnect(true);
  };

  /** Ends a socket whose session or person is no more, and leaves the rooms that are no longer theirs. */
  const judgeAnew = async (socket: OpenSocket): Promise<void> => {
    try {
      const session = await liveSession(pools.gate, socket.data.sessionId, clock());
      const allowed = session ? await roomsFor(session) : null;
      if (!allowed) {
        end(socket);
        return;
      }
      for (const room of socket.rooms) {
        if (room !== socket.id && !allowed.includes(room)) await socket.leave(room);
      }
      await socket.join(allowed);
    } catch (error) {
      log.warn({ err: error }, 'a socket could not be checked against its session; it is closed');
      socket.disconnect(true);
    }
  };

  const revalidation = setInterval(() => {
    for (const socket of io.sockets.sockets.values()) void judgeAnew(socket);
  }, revalidateEveryMs);

  return {
    deliver: (announcement: Announcement): void => {
      if ('endedSession' in announcement) {
        for (const [, socket] of io.sockets.sockets) {
          if (socket.data.sessionId === announcement.endedSession) end(socket);
        }
        return;
      }
      if ('changedPerson' in announcement) {
        const room = rooms.person(announcement.changedPerson);
        for (const [, socket] of io.sockets.sockets) {
          if (!socket.rooms.has(room)) continue;
          void judgeAnew(socket).then(() => socket.emit(hintEvent, { topic: 'session' }));
        }
        return;
      }
      io.local.to(roomFor(announcement.to)).emit(hintEvent, announcement.hint);
    },
    /** Hints may have been missed: every client fetches what it shows again. */
    deliverGap: (): void => {
      io.local.emit(hintEvent, { topic: 'everything' });
    },
    close: async (): Promise<void> => {
      clearInterval(revalidation);
      await io.close();
    },
  };
};

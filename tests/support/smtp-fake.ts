import type { AddressInfo, Socket } from 'node:net';
import { SMTPServer } from 'smtp-server';

export type Behaviour =
	| { readonly kind: 'take' }
	| { readonly kind: 'answer'; readonly code: number; readonly at: 'recipient' | 'data' }
	/** Takes the message and never answers. */
	| { readonly kind: 'hang' }
	/** Takes the message, then breaks the connection instead of answering. */
	| { readonly kind: 'drop' };

const refusal = (code: number) =>
	Object.assign(new Error(`refused with ${code}`), { responseCode: code });

/** A mail server that does what the test says, and remembers what was fully transmitted. */
export async function openFake() {
	let behaviour: Behaviour = { kind: 'take' };
	const taken: string[] = [];
	const sockets = new Set<Socket>();
	const server = new SMTPServer({
		authOptional: true,
		disabledCommands: ['AUTH', 'STARTTLS'],
		disableReverseLookup: true,
		closeTimeout: 50,
		onRcptTo(_address, _session, done) {
			const now = behaviour;
			done(now.kind === 'answer' && now.at === 'recipient' ? refusal(now.code) : null);
		},
		onData(stream, _session, done) {
			const parts: Buffer[] = [];
			stream.on('data', (part: Buffer) => parts.push(part));
			stream.on('end', () => {
				const now = behaviour;
				if (now.kind === 'answer') return done(refusal(now.code));
				taken.push(Buffer.concat(parts).toString('utf8'));
				if (now.kind === 'hang') return;
				if (now.kind === 'drop') return sockets.forEach((socket) => socket.destroy());
				done();
			});
		}
	});
	server.on('error', () => undefined);
	server.server.on('connection', (socket: Socket) => {
		sockets.add(socket);
		socket.on('close', () => sockets.delete(socket));
	});
	await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
	return {
		url: `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`,
		taken,
		behave: (next: Behaviour) => (behaviour = next),
		close: () =>
			new Promise<void>((resolve) => {
				sockets.forEach((socket) => socket.destroy());
				server.close(() => resolve());
			})
	};
}

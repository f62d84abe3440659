import { generate } from 'selfsigned';

export interface Certificate {
	/** PEM, as is `cert`. */
	key: string;
	cert: string;
}

/** A certificate for loopback that vouches for itself. It is made anew with each process and never leaves the machine. */
export async function makeCertificate(): Promise<Certificate> {
	const made = await generate([{ name: 'commonName', value: '127.0.0.1' }], {
		keyType: 'ec',
		algorithm: 'sha256',
		extensions: [
			{ name: 'basicConstraints', cA: true, critical: true },
			{ name: 'subjectAltName', altNames: [{ type: 7, ip: '127.0.0.1' }] }
		]
	});
	return { key: made.private, cert: made.cert };
}

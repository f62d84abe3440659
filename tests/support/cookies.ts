import type { Cookies } from '@sveltejs/kit';
import { keepInBrowser, startSignIn } from '$lib/server/auth/sign-ins';
import { transact } from '$lib/server/db';

/** The cookies of one browser, as far as signing in needs them. */
export class Jar {
	readonly values = new Map<string, string>();

	get(name: string): string | undefined {
		return this.values.get(name);
	}

	set(name: string, value: string): void {
		this.values.set(name, value);
	}

	delete(name: string): void {
		this.values.delete(name);
	}

	getAll(): { name: string; value: string }[] {
		return [...this.values].map(([name, value]) => ({ name, value }));
	}

	serialize(): string {
		throw new Error('Signing in serialises no cookie.');
	}

	/** A jar that is empty, in the type that actions take. */
	static empty(): Jar & Cookies {
		return new Jar();
	}
}

/** A browser in which this person has signed in, without a line on record. */
export async function signedIn(userId: string, at: number): Promise<Jar & Cookies> {
	const jar = Jar.empty();
	keepInBrowser(jar, await transact((tx) => startSignIn(tx, userId, at)));
	return jar;
}

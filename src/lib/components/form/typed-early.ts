/**
 * On a slow machine a person types and chooses between the first paint and the moment when script takes the page
 * over. Taking over writes the values of the page's state into its controls, so what was entered until then is
 * noted just before, and entered again, as if at the keyboard, just after. This holds for every control of every
 * form, and for what the browser itself has put back on a reload.
 */
type Control = HTMLInputElement | HTMLTextAreaElement | HTMLSelectElement;

/** What somebody had entered into one control; putting it back is told to whoever listens to the control. */
export interface Entered {
	control: Control | HTMLDetailsElement;
	giveBack(): void;
}

/** Inputs that hold no entry of a person, or one that script may not put back. */
const NO_ENTRY = ['hidden', 'submit', 'button', 'reset', 'image', 'file'];

/** What differs from the page as the server sent it, in the order of the page. */
export function typedEarly(root: ParentNode): Entered[] {
	const controls = root.querySelectorAll<Control>('input, textarea, select');
	return [...unfolded(root), ...[...controls].flatMap((control) => entered(control) ?? [])];
}

/** A fold that stands open was opened by somebody, or sent so; either way it is open afterwards. */
function unfolded(root: ParentNode): Entered[] {
	return [...root.querySelectorAll('details')]
		.filter((fold) => fold.open)
		.map((control) => ({ control, giveBack: () => void (control.open = true) }));
}

function entered(control: Control): Entered | null {
	if (control instanceof HTMLSelectElement) {
		return enteredSelection(control);
	}
	if (NO_ENTRY.includes(control.type)) {
		return null;
	}
	return control instanceof HTMLInputElement && ['radio', 'checkbox'].includes(control.type)
		? enteredTick(control)
		: enteredText(control);
}

function enteredText(control: HTMLInputElement | HTMLTextAreaElement): Entered | null {
	const { value } = control;
	if (value === control.defaultValue) {
		return null;
	}
	const caret = caretOf(control);
	return {
		control,
		giveBack() {
			if (control.value !== value) {
				control.value = value;
				caret?.();
			}
			tell(control);
		}
	};
}

/** Puts the caret where it is now; null where there is none. Only text has one, a date or a number has not. */
function caretOf(control: HTMLInputElement | HTMLTextAreaElement): (() => void) | null {
	const { selectionStart, selectionEnd } = control;
	return control.ownerDocument.activeElement === control && selectionStart !== null
		? () => control.setSelectionRange(selectionStart, selectionEnd)
		: null;
}

function enteredTick(control: HTMLInputElement): Entered | null {
	const { checked } = control;
	// A radio button that lost its mark says nothing: the one that got it does.
	if (checked === control.defaultChecked || (control.type === 'radio' && !checked)) {
		return null;
	}
	return {
		control,
		giveBack() {
			control.checked = checked;
			tell(control);
		}
	};
}

function enteredSelection(control: HTMLSelectElement): Entered | null {
	const options = [...control.options];
	const chosen = options.filter((option) => option.selected);
	const sent = options.filter((option) => option.defaultSelected);
	// A list of which the server chose nothing stands on its first line by itself.
	const start = sent.length === 0 && !control.multiple ? options.slice(0, 1) : sent;
	if (chosen.length === start.length && chosen.every((option) => start.includes(option))) {
		return null;
	}
	return {
		control,
		giveBack() {
			options.forEach((option) => (option.selected = chosen.includes(option)));
			tell(control);
		}
	};
}

function tell(control: Control): void {
	control.dispatchEvent(new Event('input', { bubbles: true }));
	control.dispatchEvent(new Event('change', { bubbles: true }));
}

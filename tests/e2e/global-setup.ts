import { ensureChromium } from './ensure-chromium.mjs';

export default function globalSetup(): void {
	ensureChromium();
}

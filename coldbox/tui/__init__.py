"""The screens. Everything but `app`, `looks`, `terminal` and `widgets` works without the toolkit that paints them."""

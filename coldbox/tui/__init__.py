"""The screens. Only `app`, `widgets` and `terminal` know the toolkit; the desk and what it shows can do without."""

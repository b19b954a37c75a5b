"""The full screen, worked at the article: a file a screen; it calls the deeds of `work`."""

"""The window: it draws what shaftcore computes and asks for changes; it computes nothing."""

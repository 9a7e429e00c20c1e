from hypothesis import settings

# How fast the machine is must not decide a test.
settings.register_profile("untimed", deadline=None)
settings.load_profile("untimed")

from visionplan.optics import mounts


def test_c_and_cs_go_on_the_same_thread():
    assert mounts.thread("C") == mounts.thread("CS")


def test_other_mounts_go_on_their_own():
    assert len({mounts.thread(mount) for mount in ("C", "F", "M42", "M12", "M58")}) == 5

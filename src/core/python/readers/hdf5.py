import h5py


def read_hdf5(path, facts):
    """One channel of an HDF5 dataset: the index fixes every axis but that of time."""
    with h5py.File(path, "r") as file:
        return file[facts["dataset"]][facts["index"]]

# Targets for the two libraries that come without a usable one: Debian has no CMake package for UDUNITS-2, and none of
# FindHDF5's targets stands for both the C++ and the C library. Read by the build and, installed, by
# gaskettle-config.cmake, so that a user's project links what is found on its machine and not paths of ours.
# HDF5 (COMPONENTS CXX) has been found before; gaskettle::udunits is not defined where there is no UDUNITS-2.
find_library(GASKETTLE_UDUNITS_LIBRARY udunits2)
find_path(GASKETTLE_UDUNITS_INCLUDE udunits2.h PATH_SUFFIXES udunits2)
mark_as_advanced(GASKETTLE_UDUNITS_LIBRARY GASKETTLE_UDUNITS_INCLUDE)
if(GASKETTLE_UDUNITS_LIBRARY AND GASKETTLE_UDUNITS_INCLUDE AND NOT TARGET gaskettle::udunits)
  add_library(gaskettle::udunits INTERFACE IMPORTED)
  target_link_libraries(gaskettle::udunits INTERFACE ${GASKETTLE_UDUNITS_LIBRARY})
  target_include_directories(gaskettle::udunits SYSTEM INTERFACE ${GASKETTLE_UDUNITS_INCLUDE})
endif()

if(NOT TARGET gaskettle::hdf5)
  add_library(gaskettle::hdf5 INTERFACE IMPORTED)
  target_link_libraries(gaskettle::hdf5 INTERFACE ${HDF5_CXX_LIBRARIES})
  target_include_directories(gaskettle::hdf5 SYSTEM INTERFACE ${HDF5_INCLUDE_DIRS})
endif()

# SPDX-License-Identifier: Apache-2.0
# Finds HDF5 and sets hdf5_items: include folders and what to link. Archives are taken where they are there: the shared
# library brings some 30 others along (libcurl and what it needs, for reading from cloud storage), which cost every start
# of the command ten milliseconds and more.
find_package(HDF5 REQUIRED COMPONENTS C CXX HL)
set(hdf5_items ${HDF5_INCLUDE_DIRS} ${HDF5_CXX_LIBRARIES} ${HDF5_HL_LIBRARIES} ${HDF5_C_LIBRARIES})
option(WELLWRIGHT_HDF5_ARCHIVES "Link HDF5 from its archives, for a quick start" ON)
if(WELLWRIGHT_HDF5_ARCHIVES)
  set(folders ${HDF5_C_LIBRARIES} ${HDF5_HL_LIBRARIES})
  list(TRANSFORM folders REPLACE "/[^/]*$" "")
  foreach(part cpp:hdf5_cpp hl:hdf5_hl c:hdf5)
    string(REGEX REPLACE ":.*" "" name ${part})
    string(REGEX REPLACE ".*:" "" file ${part})
    find_library(HDF5_ARCHIVE_${name} NAMES lib${file}.a HINTS ${folders})
    mark_as_advanced(HDF5_ARCHIVE_${name})
  endforeach()
  find_library(HDF5_SZ_LIBRARY sz)
  find_library(HDF5_Z_LIBRARY z)
  mark_as_advanced(HDF5_SZ_LIBRARY HDF5_Z_LIBRARY)
  if(HDF5_ARCHIVE_cpp AND HDF5_ARCHIVE_hl AND HDF5_ARCHIVE_c AND HDF5_SZ_LIBRARY AND HDF5_Z_LIBRARY)
    set(archives ${HDF5_ARCHIVE_cpp} ${HDF5_ARCHIVE_hl} ${HDF5_ARCHIVE_c} ${HDF5_SZ_LIBRARY} ${HDF5_Z_LIBRARY}
                 ${CMAKE_DL_LIBS} m)
    include(CheckCXXSourceCompiles)
    set(CMAKE_REQUIRED_INCLUDES ${HDF5_INCLUDE_DIRS})
    set(CMAKE_REQUIRED_LIBRARIES ${archives})
    set(CMAKE_REQUIRED_QUIET ON)
    check_cxx_source_compiles("
      #include <H5Cpp.h>
      #include <hdf5_hl.h>
      int main() { H5::H5File file(\"none\", H5F_ACC_RDONLY); return H5DSis_scale(file.getId()); }" HDF5_ARCHIVES_LINK)
    unset(CMAKE_REQUIRED_INCLUDES)
    unset(CMAKE_REQUIRED_LIBRARIES)
    unset(CMAKE_REQUIRED_QUIET)
    if(HDF5_ARCHIVES_LINK)
      set(hdf5_items ${HDF5_INCLUDE_DIRS} ${archives})
    endif()
  endif()
endif()

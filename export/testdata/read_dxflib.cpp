// Reads a DXF file with the C++ library dxflib and prints polylines, vertices,
// circles and header variables, one a line.
#include <cstdio>
#include <dxflib/dl_creationadapter.h>
#include <dxflib/dl_dxf.h>

struct Printer : DL_CreationAdapter {
    void addPolyline(const DL_PolylineData& d) override { std::printf("polyline %s %u %d\n", attributes.getLayer().c_str(), d.number, d.flags); }
    void addVertex(const DL_VertexData& d) override { std::printf("vertex %.17g %.17g %.17g\n", d.x, d.y, d.bulge); }
    void addCircle(const DL_CircleData& d) override { std::printf("circle %s %.17g %.17g %.17g\n", attributes.getLayer().c_str(), d.cx, d.cy, d.radius); }
    void addLine(const DL_LineData&) override { std::printf("unexpected line\n"); }
    void addArc(const DL_ArcData&) override { std::printf("unexpected arc\n"); }
    void setVariableInt(const std::string& key, int value, int) override { std::printf("variable %s %d\n", key.c_str(), value); }
};

int main(int, char** argv) {
    Printer printer;
    DL_Dxf dxf;
    return dxf.in(argv[1], &printer) ? 0 : 1;
}
